import { NO_STATIC_LIMIT, type Susceptibility } from './susceptibility.ts';

/**
 * One undamped oscillator named by its static strength: eps(i xi) - 1 = C/(1 + (xi/w)^2) (methods.md section 7).
 *
 * @param strength   C, >= 0
 * @param resonance  w in rad/s, > 0
 */
export function ninhamParsegian(strength: number, resonance: number): Susceptibility {
	return {
		atXi: (xi) => {
			const x = xi / resonance;
			return strength / (1 + x * x);
		},
		atOmega: (omega) => {
			const x = omega / resonance;
			return { re: strength / (1 - x * x), im: 0 };
		},
		atZero: { ...NO_STATIC_LIMIT, finite: strength },
		knots: [],
		ulps: 5
	};
}
