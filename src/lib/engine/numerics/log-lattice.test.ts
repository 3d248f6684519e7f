import { describe, expect, it } from 'vitest';
import { logLattice } from './log-lattice.ts';

function integral(lattice: ReturnType<typeof logLattice>, f: (s: number) => number): number {
	return lattice.s.reduce((sum, s, i) => sum + lattice.weight[i] * lattice.decay[i] * f(s), 0);
}

describe('logLattice', () => {
	it.each([
		['1', 0, 1],
		['s', 1, 1],
		['s^3', 3, 6]
	])('integrates e^-s %s', (_, power, exact) => {
		const lattice = logLattice(0.26, 1, 1e-17);
		expect(integral(lattice, (s) => s ** power) / exact - 1).toBeLessThan(2e-13);
	});

	it.each([1e-1, 1e-3, 1e-6])(
		'sees structure at s = %d where the disc of analyticity is as small',
		(size) => {
			// int e^-s size/(s + size) ds against a lattice twice as fine.
			const f = (s: number): number => size / (s + size);
			const coarse = integral(logLattice(0.26, size / 2, 1e-17), f);
			const fine = integral(logLattice(0.13, size / 2, 1e-17), f);
			expect(Math.abs(coarse / fine - 1)).toBeLessThan(1e-13);
		}
	);

	it('errs with opposite signs on two lattices half a step apart', () => {
		const f = (s: number): number => s ** 3 / 6;
		const [plain, shifted] = [0, 1 / 2].map(
			(shift) => integral(logLattice(0.6, 1, 1e-17, 1e-17, shift), f) - 1
		);
		expect(Math.abs(plain)).toBeGreaterThan(1e-6);
		expect(Math.abs(plain + shifted)).toBeLessThan(1e-3 * Math.abs(plain));
	});

	it('has an even number of nodes, so that both halves are rules', () => {
		for (const step of [0.25, 0.32, 0.37]) expect(logLattice(step, 0.1, 1e-13).count % 2).toBe(0);
	});
});
