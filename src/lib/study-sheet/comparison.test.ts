import { describe, expect, it } from 'vitest';
import { comparisonLimits, comparisonTicks, differenceFrom, idealValue, ratioToIdeal } from './comparison.ts';

const plates = { kind: 'plates' } as const;
const series = (separationsNm: number[], values: number[]) => ({
	separationsNm,
	values,
	bounds: values.map(() => 0),
	met: values.map(() => true)
});

describe('ideal conductors', () => {
	it('press with 13.0 Pa at 100 nm (pi^2 hbar c / 240 d^4)', () => {
		expect(idealValue('pressure', 100, plates)).toBeCloseTo(-13.0013, 3);
	});

	it('have a pressure that is minus the slope of the energy, and a gradient that is the slope of the pressure', () => {
		const at = (quantity: 'energy' | 'pressure', d: number) => idealValue(quantity, d, plates) ?? NaN;
		const slope = (quantity: 'energy' | 'pressure') => (at(quantity, 100.01) - at(quantity, 99.99)) / 0.02e-9;
		expect(-slope('energy') / at('pressure', 100)).toBeCloseTo(1, 6);
		expect(slope('pressure') / (idealValue('gradient', 100, plates) ?? NaN)).toBeCloseTo(1, 6);
	});

	it('pull a sphere with 2 pi R times the energy, and have no closed form for a cylinder here', () => {
		const sphere = idealValue('force', 100, { kind: 'spherePlate', radiusUm: 50 });
		expect(sphere).toBeCloseTo(2 * Math.PI * 50e-6 * (idealValue('energy', 100, plates) ?? NaN), 20);
		expect(idealValue('force', 100, { kind: 'cylinderPlate', radiusUm: 50 })).toBeUndefined();
	});

	it('have the ratio one to themselves', () => {
		const ideal = [10, 100].map((d) => idealValue('pressure', d, plates) ?? NaN);
		expect(ratioToIdeal(series([10, 100], ideal), 'pressure', plates).values).toEqual([1, 1]);
		const cylinder = { kind: 'cylinderPlate', radiusUm: 5 } as const;
		expect(ratioToIdeal(series([10, 100], ideal), 'force', cylinder).values).toEqual([]);
	});
});

describe('difference from a choice', () => {
	it('is negative where the curve attracts more, whatever the sign of the reference', () => {
		expect(differenceFrom(series([10, 100], [-3, 1]), series([10, 100], [-2, 2])).values).toEqual([
			-0.5, -0.5
		]);
	});

	it('is absent where the reference has no value', () => {
		expect(differenceFrom(series([1], [-3]), series([10, 100], [-2, -1])).values).toEqual([undefined]);
	});
});

describe('limits and ticks', () => {
	it('are round and hold the bulk of the values', () => {
		const [low, high] = comparisonLimits([{ separationsNm: [], values: [0.02, 0.5, 0.93] }], 0.01);
		expect([low, high]).toEqual([0, 1]);
		expect(comparisonTicks([0, 1])).toEqual([0, 0.5, 1]);
	});

	it('are not flattened by a pole at a zero of the reference', () => {
		const values = [...Array.from({ length: 60 }, () => 0.1), 500];
		expect(comparisonLimits([{ separationsNm: [], values }], 0.01)[1]).toBeLessThan(0.2);
	});

	it('stand without values', () => {
		expect(comparisonLimits([], 0.1)).toEqual([-0.1, 0.1]);
	});
});
