import { describe, expect, it } from 'vitest';
import type { PlateForces } from '../lifshitz/plates.ts';
import { lineForces } from './cylinder.ts';

/** Plates whose pressure is a bare power -d^-m, known exactly. */
const power =
	(m: number) =>
	(d: number): PlateForces => ({
		value: [-(d ** (1 - m)) / (m - 1), -(d ** -m), m * d ** (-m - 1)],
		bound: [0, 0, 0],
		parts: new Float64Array(12),
		cancellation: [1, 1, 1],
		roundingShare: [0, 0, 0],
		evaluations: 0
	});

/** int (1 + s^2)^-m ds = sqrt(pi) Gamma(m - 1/2)/Gamma(m). */
const INTEGRALS: Record<number, number> = {
	3: (3 * Math.PI) / 8,
	4: (5 * Math.PI) / 16,
	5: (35 * Math.PI) / 128
};

describe('lineForces', () => {
	it('goes on where the pressure is flat until coatings have been passed', () => {
		// Matched coatings of 1000 gaps: P = -(d + t)^-3 hardly falls at first.
		const t = 300;
		const coated = (d: number): PlateForces => {
			const there = power(3)(d + t);
			return { ...there, value: [there.value[0], there.value[1], there.value[2]] };
		};
		const [d, radius] = [0.3, 4e6];
		const { force, forceBound } = lineForces(coated, d, radius, 1e-8);
		// sqrt(2 R d) int (d + t + d s^2)^-3 ds = sqrt(2 R) (d + t)^-5/2 3 pi/8.
		const exact = -Math.sqrt(2 * radius) * (d + t) ** -2.5 * INTEGRALS[3];
		expect(Math.abs(force / exact - 1)).toBeLessThan(1e-8);
		expect(Math.abs(force - exact)).toBeLessThanOrEqual(forceBound);
	});

	it.each([
		[3, 1e-6],
		[3, 1e-10],
		[4, 1e-6],
		[4, 1e-10]
	])('integrates pressures like d^-%i over the parabola to %d, inside its bound', (m, accuracy) => {
		const [d, radius] = [0.3, 40];
		const { force, gradient, forceBound, gradientBound } = lineForces(power(m), d, radius, accuracy);
		const exactForce = -Math.sqrt(2 * radius * d) * d ** -m * INTEGRALS[m];
		const exactGradient = Math.sqrt(2 * radius * d) * m * d ** (-m - 1) * INTEGRALS[m + 1];
		expect(Math.abs(force - exactForce)).toBeLessThanOrEqual(forceBound + 1e-15 * Math.abs(exactForce));
		expect(Math.abs(gradient - exactGradient)).toBeLessThanOrEqual(gradientBound + 1e-15 * exactGradient);
		expect(forceBound).toBeLessThanOrEqual(accuracy * Math.abs(force));
		expect(gradientBound).toBeLessThanOrEqual(accuracy * Math.abs(gradient));
	});
});
