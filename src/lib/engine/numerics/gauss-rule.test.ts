import { Decimal } from 'decimal.js';
import { describe, expect, it } from 'vitest';
import { gaussRule } from './gauss-rule.ts';

const Precise = Decimal.clone({ precision: 50 });

/** p_m and its derivative by the monic recurrence in 50 digits. */
function polynomial(x: Decimal, degree: number, length: number): { value: Decimal; slope: Decimal } {
	let [before, value] = [new Precise(0), new Precise(1)];
	let [slopeBefore, slope] = [new Precise(0), new Precise(0)];
	for (let k = 0; k < degree; k++) {
		const k2 = new Precise(k * k);
		const thinning =
			length === Infinity ? new Precise(1) : new Precise(1).minus(k2.div(new Precise(length).pow(2)));
		const b = k2.mul(thinning).div(4 * k * k - 1);
		const next = x.mul(value).minus(b.mul(before));
		const slopeNext = value.plus(x.mul(slope)).minus(b.mul(slopeBefore));
		[before, value, slopeBefore, slope] = [value, next, slope, slopeNext];
	}
	return { value, slope };
}

describe('gaussRule', () => {
	it.each([
		[5, 8],
		[6, 64],
		[8, 4096],
		[11, 16],
		[11, 1048576],
		[12, Infinity],
		[16, Infinity]
	])('has nodes of 1e-16 against 50 digits: %i nodes, length %d', (count, length) => {
		for (const node of gaussRule(count, length).nodes) {
			const x = new Precise(node);
			const { value, slope } = polynomial(x, count, length);
			expect(value.div(slope).abs().toNumber()).toBeLessThan(2.3e-16);
		}
	});

	it.each([
		[5, 8],
		[8, 64],
		[11, 16],
		[11, 1024]
	])('sums powers up to degree 2m - 1 over integers exactly: %i nodes, %i integers', (count, length) => {
		const { nodes, weights } = gaussRule(count, length);
		for (let degree = 0; degree <= 2 * count - 1; degree++) {
			let exact = new Precise(0);
			for (let j = 0; j < length; j++)
				exact = exact.plus(new Precise(2 * j + 1 - length).div(length).pow(degree));
			const sum = nodes.reduce((total, x, i) => total + weights[i] * x ** degree, 0);
			// Four units in the last place of the largest sum, which is one.
			expect(Math.abs(sum - exact.div(length).toNumber())).toBeLessThan(9e-16);
		}
	});

	it('is Legendre for an infinite length', () => {
		const { nodes, weights } = gaussRule(3, Infinity);
		expect(nodes[2]).toBeCloseTo(Math.sqrt(0.6), 15);
		expect(weights[1]).toBeCloseTo(4 / 9, 15);
	});

	it('takes every integer with weight one where there are as many nodes as integers', () => {
		const { nodes, weights } = gaussRule(8, 8);
		nodes.forEach((x, i) => expect(x).toBeCloseTo((2 * i - 7) / 8, 14));
		weights.forEach((w) => expect(w).toBeCloseTo(1 / 8, 14));
	});

	it('projects on the last orthonormal polynomials', () => {
		const { nodes, projections } = gaussRule(6, Infinity);
		const legendre4 = (x: number): number => ((35 * x ** 4 - 30 * x ** 2 + 3) / 8) * 3;
		const onto = (row: Float64Array): number => nodes.reduce((sum, x, i) => sum + row[i] * legendre4(x), 0);
		expect(onto(projections[0])).toBeCloseTo(0, 14);
		expect(Math.abs(onto(projections[1]))).toBeCloseTo(1, 14);
		expect(onto(projections[2])).toBeCloseTo(0, 14);
	});

	it.each([
		[0, 8],
		[17, Infinity],
		[9, 8],
		[2.5, 8]
	])('refuses %d nodes over a length of %d', (count, length) => {
		expect(() => gaussRule(count, length)).toThrow(RangeError);
	});
});
