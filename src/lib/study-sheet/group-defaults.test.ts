import { describe, expect, it } from 'vitest';
import { decodeStudy } from '../schemas/study-address.ts';
import { conductorSlots, deviations, undecided, withConduction } from './group-defaults.ts';
import type { VersionFacts } from './version-facts.ts';

const facts = (ref: string, slug: string, name: string, staticLimit: VersionFacts['staticLimit']) => [
	ref,
	{ ref, material: { slug, name }, staticLimit } as VersionFacts
];
const FACTS: Record<string, VersionFacts> = Object.fromEntries([
	facts('gold-drude@1.0', 'gold', 'Gold', 'drude'),
	facts('gold-table@2.0', 'gold', 'Gold', 'drude'),
	facts('silica@1.0', 'silica', 'Silica, fused', 'finite'),
	facts('vacuum@1.0', 'vacuum', 'Vacuum', 'finite'),
	facts('mirror@1.0', 'mirror', 'Mirror', 'ideal')
]);
const study = (query: string) => decodeStudy(new URLSearchParams(query)).study;
const DEFAULTS = { conduction: 'drude', gold: 'gold-drude@1.0', temperatureK: 300 } as const;

describe('a group’s defaults', () => {
	it('ask for the static term of conductors alone', () => {
		const open = study('?left=gold-drude@1.0&medium=vacuum@1.0&right=silica@1.0&choice=One');
		expect(conductorSlots(open, FACTS)).toEqual(['left']);
		expect(undecided(open, FACTS)).toEqual(['Gold']);
		expect(undecided(withConduction(open, 'plasma', FACTS), FACTS)).toEqual([]);
		expect(undecided(study('?left=mirror@1.0&medium=vacuum@1.0&right=silica@1.0'), FACTS)).toEqual([]);
	});

	it('take a rule that every choice states as an answer', () => {
		const query = '?left=gold-drude@1.0&medium=vacuum@1.0&right=silica@1.0&choice=A;left:!drude';
		expect(undecided(study(`${query}&choice=B;left:!plasma`), FACTS)).toEqual([]);
		expect(undecided(study(`${query}&choice=B`), FACTS)).toEqual(['Gold']);
	});

	it('name each deviation with the choices that it is in', () => {
		const apart = study(
			'?left=gold-drude@1.0&medium=vacuum@1.0&right=silica@1.0&T=293&choice=A;left:!drude&choice=B;left:gold-table@2.0!plasma'
		);
		expect(deviations(apart, DEFAULTS, FACTS)).toEqual([
			'293 K in the place of 300 K',
			'B: gold-table@2.0 in the place of gold-drude@1.0',
			'B: Gold by plasma in the place of Drude'
		]);
		expect(
			deviations(
				study('?left=gold-drude@1.0!drude&medium=vacuum@1.0&right=silica@1.0&T=300'),
				DEFAULTS,
				FACTS
			)
		).toEqual([]);
	});
});
