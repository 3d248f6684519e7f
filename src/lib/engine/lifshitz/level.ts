/**
 * How finely a point is computed. A point starts at the coarsest level that can meet the accuracy asked for and climbs
 * until its bound does; every choice depends on the request alone, never on other points.
 */
export interface Level {
	/**
	 * Steps h of the lattice in ln s by grade: the first where a frequency may carry the result, coarser ones where it
	 * weighs less than each of GRADES. What they leave open is measured all the same.
	 */
	steps: readonly number[];
	/** Step of two lattices that are computed together, shifted by half a step. */
	paired: number;
	/** What may be left out at the ends of a lattice. */
	cut: number;
	/** Gauss nodes of one block of frequencies. */
	nodes: number;
	/** The first Matsubara terms, up to and without this one, are summed one by one; a power of two. */
	direct: number;
	/** Finest accuracy this level is tried for. */
	reach: number;
}

/** Weights, as shares of the sum so far, from which on the next coarser step is taken. */
const GRADES = [1e-2, 1e-4, 1e-6] as const;

export const LEVELS: readonly Level[] = [
	{ steps: [0.39, 0.45, 0.55, 0.7], paired: 0.56, cut: 1e-10, nodes: 6, direct: 8, reach: 1e-6 },
	{ steps: [0.32, 0.36, 0.42, 0.52], paired: 0.48, cut: 1e-11, nodes: 7, direct: 16, reach: 1e-8 },
	{ steps: [0.25, 0.27, 0.3, 0.34], paired: 0.36, cut: 1e-17, nodes: 11, direct: 16, reach: 0 }
];

/** The grade of a frequency whose block weighs this share of the result. */
export function gradeOf(share: number): number {
	let grade = 0;
	while (grade < GRADES.length && share < GRADES[grade]) grade++;
	return grade;
}

/**
 * What both ends of a lattice leave out together, in units of `cut`. At the top s^3 e^-s of the gradient is cut where it
 * holds 0.13 of it, at the foot, where s falls doubly exponentially, the rest is a twentieth of the slope that is
 * compared with it, against an integrand that fills at least half of its disc.
 */
export const LEFT_OUT = 0.3;

/**
 * Errors of a lattice in terms of what its even and odd nodes differ by. That difference lives at the frequency 1/(2h)
 * of the integrand in u, the error of the whole at 1/h, that of two lattices shifted by h/2 at 2/h; analyticity for
 * |Im u| < pi/2 makes spectra fall like exp(-pi^2 frequency). The constants, for F, P and G, cover the powers of the
 * frequency that go with it and phases at which the difference is small by chance.
 */
export const LATTICE_CONSTANTS = [14, 26, 50] as const;

/** The same for two shifted lattices: powers of four times the frequency, not of twice it. */
export const PAIRED_CONSTANTS = [40, 140, 520] as const;

/** exp(-pi^2 (1/h - 1/(2h))): error of one lattice over the difference of its halves. */
export const singleFall = (step: number): number => Math.exp(-(Math.PI ** 2) / (2 * step));

/** exp(-pi^2 (2/h - 1/(2h))): error of the mean of two shifted lattices over the same difference. */
export const doubledFall = (step: number): number => Math.exp((-3 * Math.PI ** 2) / (2 * step));
