import { describe, expect, it } from 'vitest';
import { AXIS_MARKS, barParts, covers, energyAtPercent, percentOfEnergy } from './energy-axis.ts';

describe('the energy axis', () => {
	it('puts the ends at the ends and 1 eV three sevenths along', () => {
		expect(percentOfEnergy(1e-3)).toBe(0);
		expect(percentOfEnergy(1e4)).toBe(100);
		expect(percentOfEnergy(1)).toBeCloseTo((3 / 7) * 100, 10);
	});

	it('holds what lies outside at the nearer end', () => {
		expect(percentOfEnergy(1e-9)).toBe(0);
		expect(percentOfEnergy(1e9)).toBe(100);
	});

	it('finds the energy under a place', () => {
		for (const energyEv of [0.001, 0.02, 0.987, 42, 1e4]) {
			expect(energyAtPercent(percentOfEnergy(energyEv)) / energyEv).toBeCloseTo(1, 12);
		}
	});

	it('names every decade with its unit', () => {
		const labels = AXIS_MARKS.filter((mark) => mark.label !== '').map((mark) => mark.label);
		expect(labels).toEqual(['1 meV', '10 meV', '100 meV', '1 eV', '10 eV', '100 eV', '1 keV', '10 keV']);
	});
});

describe('barParts', () => {
	const measured = { low: 1, high: 10 };

	it('draws extrapolation on both sides of the measured span, without overlap', () => {
		const parts = barParts(measured, { low: 1e-3, high: 1e3 });
		expect(parts.map((part) => part.kind)).toEqual(['extrapolated', 'measured', 'extrapolated']);
		expect(parts[0].left + parts[0].width).toBeCloseTo(parts[1].left, 10);
		expect(parts[1].left + parts[1].width).toBeCloseTo(parts[2].left, 10);
	});

	it('leaves out a side that the model does not add', () => {
		const above = barParts(measured, { low: 1, high: 100 });
		expect(above.map((part) => part.kind)).toEqual(['measured', 'extrapolated']);
		expect(barParts(measured, null).map((part) => part.kind)).toEqual(['measured']);
	});

	it('shows a model without any measured span as extrapolated', () => {
		expect(barParts(null, { low: 0.1, high: 1 }).map((part) => part.kind)).toEqual(['extrapolated']);
		expect(barParts(null, null)).toEqual([]);
	});

	it('draws nothing for a span beyond the axis', () => {
		expect(barParts({ low: 2e4, high: 3e5 }, null)).toEqual([]);
	});
});

describe('covers', () => {
	it('includes the ends and excludes a version without a measured span', () => {
		const range = { low: 0.64, high: 6.6 };
		expect(covers(range, 0.64)).toBe(true);
		expect(covers(range, 6.7)).toBe(false);
		expect(covers(null, 1)).toBe(false);
	});
});
