/**
 * How finely a point is computed. A point starts at the coarsest level that can meet the accuracy asked for and climbs
 * until its bound does; every choice depends on the request alone, never on other points.
 */
export interface Level {
	/** Step of the lattice in ln s, and what may be left out at its ends. */
	step: number;
	cut: number;
	/** Gauss nodes of one block of frequencies. */
	nodes: number;
	/** The first Matsubara terms, up to and without this one, are summed one by one; a power of two. */
	direct: number;
	/** Finest accuracy this level is tried for. */
	reach: number;
	/** Error of the whole lattice over the half difference of its even and odd sums, for F, P and G. */
	latticeFactor: readonly [number, number, number];
}

export const LEVELS: readonly Level[] = [
	{ step: 0.5, cut: 1e-10, nodes: 5, direct: 8, reach: 1e-7, latticeFactor: [1e-3, 1e-3, 3e-3] },
	{ step: 0.36, cut: 1e-13, nodes: 7, direct: 16, reach: 1e-9, latticeFactor: [1e-4, 1e-4, 3e-4] },
	{ step: 0.27, cut: 1e-16, nodes: 9, direct: 16, reach: 0, latticeFactor: [1e-5, 1e-5, 3e-5] }
];
