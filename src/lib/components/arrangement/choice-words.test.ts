import { describe, expect, it } from 'vitest';
import type { VersionFacts } from '../../study-sheet/version-facts.ts';
import { WORKED_STUDY } from '../../schemas/study-worked.ts';
import { changeWords, overrideWords, placeWords } from './choice-words.ts';

function facts(ref: string, slug: string, name: string, datasetTitle: string): VersionFacts {
	return {
		...{ ref, number: '1.0', datasetTitle, checksum: '', quality: 'checked', qualityReason: null },
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
		material: { slug, name, formula: null, class: 'liquid' }
	};
}

const other = WORKED_STUDY.choices[1].changes.medium.version ?? '';
const known = {
	[WORKED_STUDY.medium.version]: facts(
		WORKED_STUDY.medium.version,
		'bromobenzene',
		'Bromobenzene',
		'Two terms'
	),
	[other]: facts(other, 'bromobenzene', 'Bromobenzene', 'Seven oscillators'),
	'water@1.0': facts('water@1.0', 'water', 'Water', 'Debye')
};

describe('a choice in words', () => {
	it('names the data where the material stays', () => {
		expect(changeWords(WORKED_STUDY, WORKED_STUDY.choices[1], known)).toEqual([
			'Bromobenzene: Seven oscillators, version 1.0'
		]);
	});

	it('names the place where the material itself is another', () => {
		const choice = { name: '', changes: { medium: { version: 'water@1.0' } } };
		expect(changeWords(WORKED_STUDY, choice, known)).toEqual(['Medium Water: Debye, version 1.0']);
	});

	it('names rules and ions, and is silent where nothing changes', () => {
		const choice = {
			name: '',
			changes: { left: { zeroFrequency: 'plasma' as const } },
			debyeLengthNm: 'none' as const
		};
		expect(changeWords(WORKED_STUDY, choice, known)).toEqual([
			'Gold-lorentz-drude@1.0: static term plasma',
			'No ions'
		]);
		expect(changeWords(WORKED_STUDY, WORKED_STUDY.choices[0], known)).toEqual([]);
	});

	it('says at a place which choices fill it otherwise', () => {
		expect(overrideWords(WORKED_STUDY, 'medium')).toBe('otherwise in choice B');
		expect(overrideWords(WORKED_STUDY, 'left')).toBeUndefined();
	});

	it('counts layers from the gap', () => {
		expect([placeWords('left'), placeWords('right2')]).toEqual(['left body', 'layer 2 of the right body']);
	});
});
