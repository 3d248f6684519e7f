import type { PermeabilityModel } from './contract.ts';
import { secondsFromPs } from './units.ts';

/** Relative permeability on the imaginary axis. */
export interface Permeability {
	/** mu(i xi) for xi > 0, rad/s. */
	atXi(xi: number): number;
	/** mu at n = 0. */
	atZero: number;
	/** One at every frequency: the common case has a shorter path. */
	one: boolean;
}

/**
 * Permeability of the contract: a constant, one that is gone at every n >= 1 (which is what real ferromagnets do far
 * below the first Matsubara frequency), or a Debye relaxation 1 + (value - 1)/(1 + xi tau).
 */
export function permeability(model: PermeabilityModel | undefined): Permeability {
	if (model === undefined || model.value === 1) return { atXi: () => 1, atZero: 1, one: true };
	if (model.kind === 'constant') return { atXi: () => model.value, atZero: model.value, one: false };
	if (model.kind === 'staticOnly') return { atXi: () => 1, atZero: model.value, one: false };
	const tau = secondsFromPs(model.relaxationTimePs);
	return { atXi: (xi) => 1 + (model.value - 1) / (1 + xi * tau), atZero: model.value, one: false };
}
