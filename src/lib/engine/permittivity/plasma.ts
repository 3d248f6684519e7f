import { NO_STATIC_LIMIT, type Susceptibility } from './susceptibility.ts';

/**
 * Free carriers without damping: eps(i xi) - 1 = wp^2/xi^2 (methods.md section 7). Its TE reflection survives at
 * zero frequency.
 *
 * @param plasmaFrequency  wp in rad/s, > 0
 */
export function plasma(plasmaFrequency: number): Susceptibility {
	const wp2 = plasmaFrequency * plasmaFrequency;
	return {
		atXi: (xi) => wp2 / (xi * xi),
		atOmega: (omega) => ({ re: -wp2 / (omega * omega), im: 0 }),
		atZero: { ...NO_STATIC_LIMIT, square: wp2, plasmaSquared: wp2 },
		knots: [],
		ulps: 4
	};
}
