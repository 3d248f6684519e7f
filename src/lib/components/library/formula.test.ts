import { describe, expect, it } from 'vitest';
import { formulaRuns } from './formula.ts';

/** Lowered runs in underscores. */
const marked = (formula: string) =>
	formulaRuns(formula)
		.map(({ text, lowered }) => (lowered ? `_${text}_` : text))
		.join('');

describe('formulaRuns', () => {
	it.each([
		['Au', 'Au'],
		['SiO2', 'SiO_2_'],
		['C6H5Br', 'C_6_H_5_Br'],
		['MgAl2O4', 'MgAl_2_O_4_'],
		['(C2F4)n', '(C_2_F_4_)_n_'],
		['In2O3:Sn', 'In_2_O_3_:Sn'],
		['CuSO4·5H2O', 'CuSO_4_·5H_2_O'],
		['Al0.3Ga0.7As', 'Al_0.3_Ga_0.7_As'],
		['ZnS', 'ZnS'],
		['', '']
	])('cuts %s', (formula, expected) => {
		expect(marked(formula)).toBe(expected);
	});

	it('loses no character', () => {
		for (const formula of ['H2O', '(C8H8)n', 'KAl3Si3O10(OH)2']) {
			expect(
				formulaRuns(formula)
					.map((run) => run.text)
					.join('')
			).toBe(formula);
		}
	});
});
