import { describe, expect, it } from 'vitest';
import type { ForcePoint } from '../engine/contract.ts';
import { bracket, interpolate, meanExponent, seriesOf, sharesOf } from './series.ts';

const parts = (zeroTe: number, zeroTm: number, te: number, tm: number) => ({ zeroTe, zeroTm, te, tm });

function aPoint(separationNm: number, pressurePa: number, more: Partial<ForcePoint> = {}): ForcePoint {
	return {
		separationNm,
		freeEnergyJPerM2: pressurePa * separationNm * 1e-9,
		pressurePa,
		pressureGradientPaPerM: 1,
		errorBound: { freeEnergy: 1e-7, pressure: 2e-7, pressureGradient: 3e-7 },
		met: true,
		...more
	};
}

describe('series of results', () => {
	it('orders what arrived in any order and leaves out what has not', () => {
		const series = seriesOf([aPoint(10, -1), undefined, aPoint(1, -1000)], 'pressure');
		expect(series).toEqual({
			separationsNm: [1, 10],
			values: [-1000, -1],
			bounds: [2e-7, 2e-7],
			met: [true, true]
		});
	});

	it('has no force where the shape has none', () => {
		expect(seriesOf([aPoint(10, -1)], 'force').values).toEqual([]);
		expect(seriesOf([aPoint(10, -1, { forceN: -3e-9 })], 'force')).toMatchObject({
			values: [-3e-9],
			bounds: [2e-7]
		});
	});

	it('takes shares over the sum of magnitudes, so that they stay between 0 and 1 where parts cancel', () => {
		const pressurePa = parts(0, 1, -0.5, -1.5);
		const breakdown = { pressurePa, freeEnergyJPerM2: pressurePa, pressureGradientPaPerM: pressurePa };
		const shares = sharesOf([aPoint(10, -1, { breakdown })], 'pressure');
		expect(shares.static[0]).toBeCloseTo(1 / 3, 12);
		expect(shares.te[0]).toBeCloseTo(0.5 / 3, 12);
	});
});

describe('values between the points', () => {
	const separations = [1, 10, 100];

	it.each([
		[0.5, -1],
		[1, 0],
		[9.99, 0],
		[10, 1],
		[100, 1],
		[101, -1]
	])('bracket of %d is %i', (d, index) => {
		expect(bracket(separations, d)).toBe(index);
	});

	it('follows a power law exactly', () => {
		const values = separations.map((d) => -8 * d ** -3);
		expect(interpolate(separations, values, 31.4)).toBeCloseTo(-8 * 31.4 ** -3, 12);
	});

	it('passes through zero where the sign changes', () => {
		expect(interpolate([1, 100], [-2, 2], 10)).toBeCloseTo(0, 12);
	});

	it('has no value outside', () => {
		expect(interpolate(separations, [1, 2, 3], 1000)).toBeUndefined();
	});

	it('gives the mean exponent, and none across a change of sign', () => {
		expect(meanExponent(10, -8, 100, -0.008)).toBeCloseTo(-3, 12);
		expect(meanExponent(10, -8, 100, 8)).toBeUndefined();
		expect(meanExponent(10, -8, 10, -8)).toBeUndefined();
	});
});
