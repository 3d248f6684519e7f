import { describe, expect, it } from 'vitest';
import {
	closestSeparationNm,
	evaluate,
	Refusal,
	type ForceRequest,
	type Roughness
} from '../../src/lib/engine/index.ts';
import type { PlateForces } from '../../src/lib/engine/lifshitz/plates.ts';
import { cutGaussianRule } from '../../src/lib/engine/numerics/cut-gaussian-rule.ts';
import { roughPlates } from '../../src/lib/engine/shapes/roughness.ts';
import { between, bromobenzene, metal, silica, vacuum } from '../support/analysis-arrangements.ts';

/** Plates whose quantities are one pure power of the separation, exactly known. */
const power =
	(exponent: number) =>
	(d: number): PlateForces => {
		const value = -(d ** -exponent);
		const parts = new Float64Array(12);
		for (const q of [0, 1, 2]) parts[4 * q + 3] = value;
		return {
			value: [value, value, value],
			bound: [0, 0, 0],
			parts,
			cancellation: [1, 1, 1],
			roundingShare: [0, 0, 0],
			evaluations: 1
		};
	};

const ratio = (
	roughness: Roughness,
	accuracy = 1e-12
): { off: (expected: number) => number; bound: number } => {
	const smooth = power(4);
	const rough = roughPlates(smooth, roughness, accuracy)(1e-7);
	const own = smooth(1e-7).value[1];
	return { off: (expected) => Math.abs(rough.value[1] / own / expected - 1), bound: rough.bound[1] / -own };
};

const rms = (rmsNm: number) => ({ kind: 'rms', rmsNm }) as const;

describe('the Gauss rule of a cut normal distribution', () => {
	it('has its even moments', () => {
		const { nodes, weights } = cutGaussianRule(8);
		const moment = (degree: number) => weights.reduce((sum, w, i) => sum + w * nodes[i] ** degree, 0);
		expect(moment(0)).toBeCloseTo(1, 14);
		expect(moment(1)).toBeCloseTo(0, 14);
		// Cut at six: 1 and 3 less some 1e-7.
		expect(moment(2)).toBeCloseTo(1, 6);
		expect(moment(4)).toBeCloseTo(3, 4);
	});
});

describe('an average over heights', () => {
	it('is exact for two levels', () => {
		const levels = { kind: 'histogram', heightsNm: [-5, 5], weights: [0.5, 0.5] } as const;
		expect(
			ratio({ left: { ...levels, heightsNm: [-5, 5], weights: [1, 1] } }).off(1.025220068973354)
		).toBeLessThan(1e-13);
	});

	it('has the figure of a normal distribution of 5 nm, whichever surface is rough', () => {
		// Cut at six standard deviations, d^-4, 100 nm; extended precision.
		const expected = 1.025676639245794;
		for (const roughness of [{ left: rms(5) }, { right: rms(5) }, { left: rms(3), right: rms(4) }]) {
			const { off, bound } = ratio(roughness);
			expect(off(expected)).toBeLessThan(1e-12);
			expect(off(expected)).toBeLessThanOrEqual(bound);
		}
	});

	it('agrees with its own second order, 1 + 10 (sigma/d)^2', () => {
		const { off } = ratio({ left: rms(0.5) });
		// The next order is 105 (sigma/d)^4 = 6.6e-8.
		expect(off(1 + 10 * 0.005 ** 2)).toBeLessThan(7e-8);
	});

	it('keeps its bound as near as it goes', () => {
		for (const accuracy of [1e-3, 1e-6, 1e-9]) {
			const sigma = 100 / 9.01;
			const coarse = ratio({ left: rms(sigma) }, accuracy);
			const fine = roughPlates(power(4), { left: rms(sigma) }, 1e-14)(1e-7).value[1] / -(1e-7 ** -4);
			expect(coarse.off(fine)).toBeLessThanOrEqual(coarse.bound);
			expect(coarse.bound).toBeLessThan(accuracy);
		}
	});

	it('has the second order of a true curve, as a correction that the answer states', () => {
		const request = between(metal, vacuum, metal, {
			temperatureK: 300,
			separationsNm: [100],
			roughness: { left: rms(0.3), right: rms(0.4) }
		});
		const factor = evaluate(request).points[0].analysis?.roughnessFactor?.pressure;
		// 1.018926567 at 5 nm is 1 + 0.018926567 (sigma/5 nm)^2 to second order; fourth order is 1e-6 of that here.
		expect((Number(factor?.value) - 1) / (0.018926567 / 100)).toBeCloseTo(1, 2);
	});

	it('subtracts the mean height and mixes a histogram with an rms', () => {
		const shifted = { kind: 'histogram' as const, heightsNm: [5, 15], weights: [2, 2] };
		expect(ratio({ left: shifted }).off(1.025220068973354)).toBeLessThan(1e-13);
		const both = ratio({ left: shifted, right: rms(5) });
		const [lower, upper] = [95, 105].map(
			(nm) => roughPlates(power(4), { right: rms(5) }, 1e-12)(nm * 1e-9).value[1]
		);
		expect(both.off((lower + upper) / 2 / -(1e-7 ** -4))).toBeLessThan(1e-12);
	});
});

describe('a request with roughness', () => {
	const of = (options: Parameters<typeof between>[3]): ForceRequest =>
		between(metal, bromobenzene, silica, { separationsNm: [60, 100], ...options });

	it('keeps its accuracy, and P is still -dF/dd', () => {
		const step = 1e-3;
		const [before, at, after] = evaluate(
			of({ roughness: { left: rms(3), right: rms(2) }, separationsNm: [60 - step, 60, 60 + step] })
		).points;
		expect(at.met).toBe(true);
		const slope = -(after.freeEnergyJPerM2 - before.freeEnergyJPerM2) / (2 * step * 1e-9);
		expect(slope / at.pressurePa).toBeCloseTo(1, 5);
	});

	it('applies to curved bodies', () => {
		const shape = { kind: 'spherePlate', radiusUm: 50 } as const;
		const [point] = evaluate(of({ roughness: { left: rms(3) }, shape })).points;
		expect(point.forceN).toBe(2 * Math.PI * 50e-6 * point.freeEnergyJPerM2);
		const line = evaluate(
			of({
				roughness: { left: rms(3) },
				shape: { kind: 'cylinderPlate', radiusUm: 50 },
				relativeAccuracy: 1e-6
			})
		).points[0];
		expect(line.met).toBe(true);
	});

	it('is refused nearer than a stated multiple of the peaks', () => {
		const roughness = { left: rms(3), right: rms(4) };
		const closest = closestSeparationNm(roughness);
		expect(closest).toBeCloseTo(1.5 * 6 * 5, 12);
		expect(() => evaluate(of({ roughness, separationsNm: [closest * 0.999] }))).toThrow(Refusal);
		expect(evaluate(of({ roughness, separationsNm: [closest] })).points[0].met).toBe(true);
	});

	it.each<[string, Roughness]>([
		['arrangement.roughness.left.rmsNm', { left: rms(-1) }],
		[
			'arrangement.roughness.right.weights',
			{ right: { kind: 'histogram', heightsNm: [1, 2], weights: [1] } }
		],
		[
			'arrangement.roughness.right.weights',
			{ right: { kind: 'histogram', heightsNm: [1, 2], weights: [0, 0] } }
		],
		['arrangement.roughness.right.heightsNm', { right: { kind: 'histogram', heightsNm: [], weights: [] } }],
		['separationsNm', { left: rms(30) }]
	])('names %s', (path, roughness) => {
		const issues = () => {
			try {
				evaluate(of({ roughness }));
			} catch (error) {
				if (error instanceof Refusal) return error.issues.map((issue) => issue.path);
			}
			return [];
		};
		expect(issues()).toContain(path);
	});
});
