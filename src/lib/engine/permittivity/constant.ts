import { NO_STATIC_LIMIT, type Susceptibility } from './susceptibility.ts';

/**
 * A permittivity that does not depend on frequency: eps(i xi) = value. It never falls to one, so short distances are
 * overstated; useful as a check and for narrow bands.
 *
 * @param value  eps, >= 1
 */
export function constant(value: number): Susceptibility {
	const chi = value - 1;
	return {
		atXi: () => chi,
		atOmega: () => ({ re: chi, im: 0 }),
		atZero: { ...NO_STATIC_LIMIT, finite: chi },
		knots: [],
		ulps: 1
	};
}
