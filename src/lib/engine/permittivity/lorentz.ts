import { drude } from './drude.ts';
import { NO_STATIC_LIMIT, type Susceptibility } from './susceptibility.ts';

/**
 * One damped oscillator: eps(i xi) - 1 = f/(w0^2 + xi^2 + gamma xi) (methods.md section 7). A resonance at zero is a
 * free carrier and is treated as one.
 *
 * @param strength   f in (rad/s)^2, >= 0
 * @param resonance  w0 in rad/s, >= 0
 * @param damping    gamma in rad/s, >= 0
 */
export function lorentz(strength: number, resonance: number, damping: number): Susceptibility {
	if (resonance === 0) return drude(Math.sqrt(strength), damping);
	const w2 = resonance * resonance;
	return {
		atXi: (xi) => strength / (w2 + xi * (xi + damping)),
		atOmega: (omega) => {
			const a = w2 - omega * omega;
			const b = damping * omega;
			const norm = a * a + b * b;
			return { re: (strength * a) / norm, im: (strength * b) / norm };
		},
		atZero: { ...NO_STATIC_LIMIT, finite: strength / w2 },
		knots: [],
		ulps: 6
	};
}
