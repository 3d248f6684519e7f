/**
 * How finely a point is computed. A point starts at the coarsest level that can meet the accuracy asked for and climbs
 * until its bound does; every choice depends on the request alone, never on other points.
 */
export interface Level {
	/** Step h of the lattice in ln s, and what may be left out at its ends. */
	step: number;
	cut: number;
	/** Gauss nodes of one block of frequencies. */
	nodes: number;
	/** The first Matsubara terms, up to and without this one, are summed one by one; a power of two. */
	direct: number;
	/** Finest accuracy this level is tried for. */
	reach: number;
}

export const LEVELS: readonly Level[] = [
	{ step: 0.35, cut: 1e-13, nodes: 6, direct: 8, reach: 1e-6 },
	{ step: 0.29, cut: 1e-15, nodes: 7, direct: 8, reach: 1e-8 },
	{ step: 0.25, cut: 1e-17, nodes: 11, direct: 16, reach: 0 }
];

/**
 * Errors of a lattice in terms of what its even and odd nodes differ by. That difference lives at the frequency 1/(2h)
 * of the integrand in u, the error of the whole at 1/h, that of two lattices shifted by h/2 at 2/h; analyticity for
 * |Im u| < pi/2 makes spectra fall like exp(-pi^2 frequency). The constants, for F, P and G, cover the powers of the
 * frequency that go with it and phases at which the difference is small by chance.
 */
export const LATTICE_CONSTANTS = [20, 32, 50] as const;

/** exp(-pi^2 (1/h - 1/(2h))): error of one lattice over the difference of its halves. */
export const singleFall = ({ step }: Level): number => Math.exp(-(Math.PI ** 2) / (2 * step));

/** exp(-pi^2 (2/h - 1/(2h))): error of the mean of two shifted lattices over the same difference. */
export const doubledFall = ({ step }: Level): number => Math.exp((-3 * Math.PI ** 2) / (2 * step));
