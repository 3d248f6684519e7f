import { describe, expect, it } from 'vitest';
import { ELEMENTS } from './elements.ts';
import { formulaUnit } from './formula.ts';

describe('formulaUnit', () => {
	// Electrons count by hand; molar masses from the standard atomic weights, to their five digits.
	it.each([
		['Au', 79, 196.97],
		['H2O', 10, 18.015],
		['SiO2', 30, 60.083],
		['CaCO3', 50, 100.09],
		['C6H5Br', 76, 157.01],
		['KAl2(AlSi3O10)(OH)2', 198, 398.31],
		['Ba0.5Sr0.5TiO3', 93, 208.34]
	])('counts %s', (formula, electrons, molarMass) => {
		const unit = formulaUnit(formula);
		expect(unit?.electrons).toBeCloseTo(electrons, 9);
		expect(Math.abs((unit?.molarMass ?? 0) / molarMass - 1)).toBeLessThan(1e-4);
	});

	it.each(['', 'Xx2', '2H', '(H2O', 'H2O)', 'h2o', '(C2F4)n', 'H2 O'])('has no count for "%s"', (formula) => {
		expect(formulaUnit(formula)).toBeNull();
	});

	it('knows the elements in their order', () => {
		expect(ELEMENTS.size).toBe(92);
		expect(ELEMENTS.get('U')?.atomicNumber).toBe(92);
		expect(ELEMENTS.get('Xe')).toEqual({ atomicNumber: 54, molarMass: 131.29 });
	});
});
