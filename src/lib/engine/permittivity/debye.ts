import { NO_STATIC_LIMIT, type Susceptibility } from './susceptibility.ts';

/**
 * Relaxation of permanent dipoles: eps(i xi) - 1 = d/(1 + xi tau) (methods.md section 7).
 *
 * @param strength        d, >= 0
 * @param relaxationTime  tau in s, > 0
 */
export function debye(strength: number, relaxationTime: number): Susceptibility {
	return {
		atXi: (xi) => strength / (1 + xi * relaxationTime),
		atOmega: (omega) => {
			const b = omega * relaxationTime;
			return { re: strength / (1 + b * b), im: (strength * b) / (1 + b * b) };
		},
		atZero: { ...NO_STATIC_LIMIT, finite: strength },
		knots: [],
		ulps: 4
	};
}
