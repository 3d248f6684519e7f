import { pchip } from '../numerics/pchip.ts';
import { NO_STATIC_LIMIT, type Susceptibility } from './susceptibility.ts';

/**
 * eps(i xi) given at points: monotone interpolation (pchip) of ln(eps - 1) against ln xi, or of eps - 1 itself where
 * a point reaches eps = 1. Below the first point the first value stands (also for n = 0); above the last eps - 1
 * falls like xi^-2, the law of every real substance.
 *
 * @param frequencies  rad/s, ascending, > 0, at least two
 * @param epsilon      eps(i xi) >= 1, not rising
 */
export function imaginaryTable(frequencies: readonly number[], epsilon: readonly number[]): Susceptibility {
	const chi = epsilon.map((value) => value - 1);
	const logarithmic = chi.every((value) => value > 0);
	const interpolant = pchip(
		frequencies.map((xi) => Math.log(xi)),
		logarithmic ? chi.map((value) => Math.log(value)) : chi
	);
	const first = frequencies[0];
	const last = frequencies[frequencies.length - 1];
	const lastChi = chi[chi.length - 1];
	return {
		atXi: (xi) => {
			if (xi <= first) return chi[0];
			if (xi >= last) return lastChi * (last / xi) ** 2;
			const value = interpolant(Math.log(xi));
			return logarithmic ? Math.exp(value) : value;
		},
		atOmega: null,
		atZero: { ...NO_STATIC_LIMIT, finite: chi[0] },
		knots: frequencies,
		ulps: 64
	};
}
