/** eps - 1 on the real axis. */
export interface ComplexValue {
	re: number;
	im: number;
}

/**
 * What is left of eps(i xi) - 1 as xi falls to zero: finite + slope/xi + square/xi^2.
 * `plasmaSquared` is wp^2 summed over everything that conducts, dampings dropped: the plasma rule needs it.
 */
export interface StaticLimit {
	finite: number;
	/** rad/s; sigma_dc/eps_0. */
	slope: number;
	/** (rad/s)^2; undamped carriers only. */
	square: number;
	/** (rad/s)^2. */
	plasmaSquared: number;
}

/** A susceptibility eps - 1, checked and precomputed; SI and angular (rad/s). */
export interface Susceptibility {
	/** eps(i xi) - 1 for xi > 0. */
	atXi(xi: number): number;
	/** eps(omega) - 1 for omega > 0; null where the model says nothing about the real axis. */
	atOmega: ((omega: number) => ComplexValue) | null;
	atZero: StaticLimit;
	/** xi where atXi is not analytic (knots of an interpolation), ascending. */
	knots: readonly number[];
	/** Rounding error of atXi, in units of the last place. */
	ulps: number;
}

export const NO_STATIC_LIMIT: StaticLimit = { finite: 0, slope: 0, square: 0, plasmaSquared: 0 };

/** Limits of a sum are the sums of the limits. */
export function addLimits(limits: readonly StaticLimit[]): StaticLimit {
	return limits.reduce(
		(sum, one) => ({
			finite: sum.finite + one.finite,
			slope: sum.slope + one.slope,
			square: sum.square + one.square,
			plasmaSquared: sum.plasmaSquared + one.plasmaSquared
		}),
		NO_STATIC_LIMIT
	);
}

export const conducts = ({ slope, square }: StaticLimit): boolean => slope > 0 || square > 0;
