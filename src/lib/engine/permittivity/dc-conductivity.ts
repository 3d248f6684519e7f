import { VACUUM_PERMITTIVITY } from '../constants.ts';
import { NO_STATIC_LIMIT, type Susceptibility } from './susceptibility.ts';

/**
 * A frequency-independent conductivity: eps(i xi) - 1 = sigma/(eps_0 xi) (methods.md section 7). Meant for the n = 0
 * term of weakly conducting matter; useless above the inverse collision time.
 *
 * @param conductivity  sigma in S/m, > 0
 */
export function dcConductivity(conductivity: number): Susceptibility {
	const slope = conductivity / VACUUM_PERMITTIVITY;
	return {
		atXi: (xi) => slope / xi,
		atOmega: (omega) => ({ re: 0, im: slope / omega }),
		atZero: { ...NO_STATIC_LIMIT, slope },
		knots: [],
		ulps: 3
	};
}
