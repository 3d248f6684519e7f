import { describe, expect, it } from 'vitest';
import { PRESSURE } from '../format/quantity.ts';
import { WORKED_STUDY } from '../schemas/study-worked.ts';
import type { VersionFacts } from './version-facts.ts';
import { relianceAt, worstState } from './version-facts.ts';
import {
	boundWords,
	conductionWords,
	ingredients,
	relianceWords,
	shortChecksum,
	studyTitle,
	tellingFrequency
} from './title-block.ts';

function facts(ref: string, name: string, more: Partial<VersionFacts> = {}): VersionFacts {
	return {
		...{ ref, number: '1.0', datasetTitle: '', checksum: '', quality: 'checked', qualityReason: null },
		...{
			state: 'published',
			supersededBy: null,
			staticLimit: 'finite',
			hazards: null,
			measuredRangeEv: null,
			sources: [],
			staticPermittivity: null,
			reliance: null
		},
		material: { slug: name, name, formula: null, class: 'metal' },
		...more
	};
}

const gold = facts(WORKED_STUDY.left.substrate.version, 'Gold', {
	staticLimit: 'drude',
	reliance: { xiRadPerS: [1e14, 1e16], outside: [0.8, 0.2] }
});
const liquid = facts(WORKED_STUDY.medium.version, 'Bromobenzene', { quality: 'provisional' });
const rival = facts(WORKED_STUDY.choices[1].changes.medium.version ?? '', 'Bromobenzene');
const silica = facts(WORKED_STUDY.right.substrate.version, 'Silica, fused');
const known = Object.fromEntries([gold, liquid, rival, silica].map((version) => [version.ref, version]));

describe('what a number rests on', () => {
	it('lists each version once, in the order of the drawing, with the choices that use it', () => {
		expect(
			ingredients(WORKED_STUDY, known, ['A', 'B']).map(({ facts: { ref }, letters }) => [ref, letters])
		).toEqual([
			[gold.ref, []],
			[liquid.ref, ['A']],
			[rival.ref, ['B']],
			[silica.ref, []]
		]);
	});

	it('says how a conductor is taken, chosen or not', () => {
		const [choice] = WORKED_STUDY.choices;
		expect(conductionWords(WORKED_STUDY, choice, known)).toEqual(['Gold: Drude, as the model is written']);
		const plasma = { ...choice, changes: { left: { zeroFrequency: 'plasma' as const } } };
		expect(conductionWords(WORKED_STUDY, plasma, known)).toEqual(['Gold: plasma, chosen']);
	});

	it('tells the share outside the data at c/2d', () => {
		expect(tellingFrequency(100)).toBeCloseTo(1.499e15, -12);
		expect(relianceAt(gold, 1e15)).toBeCloseTo(0.5, 12);
		expect(relianceAt(gold, 1e10)).toBe(0.8);
		expect(relianceAt(gold, 1e20)).toBe(0.2);
		const used = ingredients(WORKED_STUDY, known, ['A', 'B']);
		expect(relianceWords(used, 149.896229)).toEqual(['50 % of Gold']);
	});

	it('wears the worst state of its inputs', () => {
		expect(worstState([gold, silica])).toBe('checked');
		expect(worstState([gold, liquid])).toBe('provisional');
		expect(worstState([gold, liquid, { ...gold, state: 'withdrawn' }])).toBe('withdrawn');
	});

	it('states the bound relative and in the unit of the value', () => {
		expect(boundWords(-2.43, 1e-6, PRESSURE)).toBe('2.4 µPa, 1 × 10^\u22126 of the value');
		expect(boundWords(-2.43, null, PRESSURE)).toBe('being computed');
		expect(boundWords(0, 0, PRESSURE)).toBe('exact');
	});

	it('shortens a checksum', () => {
		expect(shortChecksum(`sha256:${'9c41e07'.padEnd(64, '0')}`)).toBe('9c41e07');
	});
});

describe('the title', () => {
	it('names bodies and medium', () => {
		expect(studyTitle(WORKED_STUDY, known)).toBe('Gold against silica, in bromobenzene');
	});

	it('names the surface of a coated body', () => {
		const study = structuredClone(WORKED_STUDY);
		study.right.layers.push({ of: { version: gold.ref }, thicknessNm: 20 });
		expect(studyTitle(study, known)).toBe('Gold against gold on silica, in bromobenzene');
	});
});
