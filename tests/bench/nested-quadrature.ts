import { BOLTZMANN, REDUCED_PLANCK, SPEED_OF_LIGHT } from '../../src/lib/engine/constants.ts';
import { trilogarithm } from '../../src/lib/engine/numerics/trilogarithm.ts';

/**
 * How the formula reads on paper: every Matsubara term on its own, and for each a quadrature over y that halves its
 * intervals until two Simpson rules agree, once for each of energy, pressure and gradient. Two equal metals of the
 * Drude kind across vacuum. Only for the bench, to say what the engine is fast against.
 */

/** Beyond this y nothing is left. */
const FARTHEST = 45;

/** Halvings of an interval at most. */
const DEEPEST = 40;

function adaptive(f: (y: number) => number, from: number, to: number, tolerance: number): number {
	const rule = (a: number, fa: number, fm: number, b: number, fb: number): number =>
		((b - a) / 6) * (fa + 4 * fm + fb);
	const halve = (
		a: number,
		fa: number,
		m: number,
		fm: number,
		b: number,
		fb: number,
		whole: number,
		allowed: number,
		depth: number
	): number => {
		const [l, r] = [(a + m) / 2, (m + b) / 2];
		const [fl, fr] = [f(l), f(r)];
		const left = rule(a, fa, fl, m, fm);
		const right = rule(m, fm, fr, b, fb);
		const difference = left + right - whole;
		if (depth >= DEEPEST || Math.abs(difference) <= 15 * allowed) return left + right + difference / 15;
		return (
			halve(a, fa, l, fl, m, fm, left, allowed / 2, depth + 1) +
			halve(m, fm, r, fr, b, fb, right, allowed / 2, depth + 1)
		);
	};
	const m = (from + to) / 2;
	const [fa, fm, fb] = [f(from), f(m), f(to)];
	return halve(from, fa, m, fm, to, fb, rule(from, fa, fm, to, fb), tolerance, 0);
}

/** Energy (J/m^2), pressure (Pa) and gradient (Pa/m) of two equal metals, eps(i xi) given. */
export function nestedQuadrature(
	epsilon: (xi: number) => number,
	separation: number,
	temperature: number,
	accuracy: number
): [number, number, number] {
	// n = 0, Drude: TM reflects wholly, TE not at all.
	const zero = trilogarithm(1) / 2;
	const sums = [-zero, 2 * zero, 6 * zero];
	for (let n = 1; ; n++) {
		const xi = (2 * Math.PI * n * BOLTZMANN * temperature) / REDUCED_PLANCK;
		const eps = epsilon(xi);
		const y0 = (2 * separation * xi) / SPEED_OF_LIGHT;
		const reflections = (y: number): [number, number] => {
			const kappa = Math.sqrt(y * y + (eps - 1) * y0 * y0);
			return [((y - kappa) / (y + kappa)) ** 2, ((eps * y - kappa) / (eps * y + kappa)) ** 2];
		};
		const integrands = [
			(y: number) => reflections(y).reduce((sum, R) => sum + y * Math.log1p(-R * Math.exp(-y)), 0),
			(y: number) => reflections(y).reduce((sum, R) => sum + (y * y) / (Math.exp(y) / R - 1), 0),
			(y: number) =>
				reflections(y).reduce((sum, R) => {
					const z = R * Math.exp(-y);
					return sum + (y ** 3 * z) / (1 - z) ** 2;
				}, 0)
		];
		const terms = integrands.map((f, q) =>
			adaptive(f, y0, y0 + FARTHEST, 0.01 * accuracy * Math.abs(sums[q]))
		);
		terms.forEach((term, q) => (sums[q] += term));
		if (terms.every((term, q) => Math.abs(term) <= 0.1 * accuracy * Math.abs(sums[q]) * Math.min(1, y0)))
			break;
	}
	const area = (BOLTZMANN * temperature) / (8 * Math.PI * separation * separation);
	return [area * sums[0], (-area / separation) * sums[1], (area / separation / separation) * sums[2]];
}
