import { describe, expect, it } from 'vitest';
import { powerIntegral } from './power-integral.ts';

describe('powerIntegral', () => {
	it.each([1e-8, 0.01, 0.5, 0.999, 1, 1.001, 3, 100, 1e6])('is the arc tangent for p = 1 at r = %d', (r) => {
		expect(powerIntegral(1, r) / (Math.atan(r) / r) - 1).toBeCloseTo(0, 13);
	});

	it.each([0.3, 1, 2, 30, 1e5])('is the logarithm for p = 2 at r = %d', (r) => {
		expect(powerIntegral(2, r) / (Math.log1p(r * r) / (2 * r * r)) - 1).toBeCloseTo(0, 13);
	});

	it.each([1, 10, 1e4])('is 1/r^2 - atan(r)/r^3 for p = 3 at r = %d', (r) => {
		expect(powerIntegral(3, r) / (1 / r ** 2 - Math.atan(r) / r ** 3) - 1).toBeCloseTo(0, 11);
	});

	it.each([0.05, 0.5, 2.7, 14])('joins its two ways at r = 1 for p = %d', (p) => {
		const [below, above] = [powerIntegral(p, 1 - 1e-12), powerIntegral(p, 1 + 1e-12)];
		expect(below / above - 1).toBeCloseTo(0, 11);
	});
});
