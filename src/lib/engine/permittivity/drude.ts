import { plasma } from './plasma.ts';
import { NO_STATIC_LIMIT, type Susceptibility } from './susceptibility.ts';

/**
 * Free carriers with damping: eps(i xi) - 1 = wp^2/(xi (xi + gamma)) (methods.md section 7); the dc conductivity is
 * eps_0 wp^2/gamma.
 *
 * @param plasmaFrequency  wp in rad/s, > 0
 * @param relaxationRate   gamma in rad/s, >= 0; zero is the plasma model
 */
export function drude(plasmaFrequency: number, relaxationRate: number): Susceptibility {
	if (relaxationRate === 0) return plasma(plasmaFrequency);
	const wp2 = plasmaFrequency * plasmaFrequency;
	return {
		atXi: (xi) => wp2 / (xi * (xi + relaxationRate)),
		atOmega: (omega) => {
			const norm = omega * omega + relaxationRate * relaxationRate;
			return { re: -wp2 / norm, im: (wp2 * relaxationRate) / (omega * norm) };
		},
		atZero: { ...NO_STATIC_LIMIT, slope: wp2 / relaxationRate, plasmaSquared: wp2 },
		knots: [],
		ulps: 5
	};
}
