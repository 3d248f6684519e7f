import type { PlateForces } from '../lifshitz/plates.ts';

/** Force and gradient per length with absolute bounds. */
export interface LineForces {
	force: number;
	gradient: number;
	forceBound: number;
	gradientBound: number;
}

/** Steps in v tried in turn; each halves the one before and reuses its nodes. */
const FIRST_STEP = 0.8;
const MOST_HALVINGS = 4;

/** Nodes of the first pass at most: cosh^2 v = 10^19, far beyond where anything acts. */
const MOST_NODES = 28;

/** The far end is reached when what follows, judged by the fall of the last terms, is this share of the accuracy. */
const TAIL_SHARE = 0.02;
const TAIL_SAFETY = 1.5;
const SLOWEST_FALL = 0.7;

/** The rule's error falls quadratically with each halving; the difference is that of the cruder rule. */
const DIFFERENCE_SHARE = 0.05;

/** Sums over nodes: P and dP/dd with weights, their bounds, their magnitudes. */
type Sums = [
	pressure: number,
	gradient: number,
	bounds: number,
	gradientBounds: number,
	size: number,
	gradientSize: number
];

/**
 * Cylinder and plate, or parallel cylinders, per unit length (methods.md section 5), parabola to infinity:
 *
 *     sqrt(2 R d) int P(d (1 + s^2)) ds,   s = sinh v,   trapezoidal rule in v, even in v
 *
 * The integrand is analytic for |Im v| < pi/2 and falls in the end at least like cosh^-5 v; where that begins depends on
 * the layers, so the first pass goes on until it sees the fall.
 *
 * @param radius  effective radius, m
 * @returns force in N/m (negative attracts), gradient in N/m^2
 */
export function lineForces(
	plates: (separation: number) => PlateForces,
	separation: number,
	radius: number,
	accuracy: number
): LineForces {
	const scale = Math.sqrt(2 * radius * separation);
	const first = firstPass(plates, separation, accuracy);
	const sums = first.sums;
	let before = [sums[0] * FIRST_STEP, sums[1] * FIRST_STEP];
	let step = FIRST_STEP / 2;
	for (let halving = 1; ; halving++) {
		for (let v = step; v < first.end; v += 2 * step) addNode(plates, separation, v, sums);
		const now = [sums[0] * step, sums[1] * step];
		const shift = [0, 1].map((i) => Math.abs(now[i] - before[i]) * DIFFERENCE_SHARE);
		const done = shift.every((one, i) => one <= 0.2 * accuracy * Math.abs(now[i]));
		if (done || halving === MOST_HALVINGS) {
			const bound = (i: 0 | 1): number => scale * (shift[i] + first.tail[i] + sums[i === 0 ? 2 : 3] * step);
			return {
				force: scale * now[0],
				gradient: scale * now[1],
				forceBound: bound(0),
				gradientBound: bound(1)
			};
		}
		before = now;
		step /= 2;
	}
}

/** Nodes 0, h, 2h, ... until the terms have died, and a bound on what lies beyond. */
function firstPass(
	plates: (separation: number) => PlateForces,
	separation: number,
	accuracy: number
): { sums: Sums; end: number; tail: [number, number] } {
	const sums: Sums = [0, 0, 0, 0, 0, 0];
	const tail: [number, number] = [Infinity, Infinity];
	let last = [0, 0];
	for (let i = 0; ; i++) {
		const before = [sums[4], sums[5]];
		addNode(plates, separation, i * FIRST_STEP, sums);
		const term = [sums[4] - before[0], sums[5] - before[1]];
		for (const q of [0, 1] as const) {
			const fall = term[q] === 0 ? 0 : term[q] / last[q];
			// The integral beyond the last node, not the nodes left out at this step: finer passes leave out more.
			const reach = FIRST_STEP / -Math.log(fall);
			tail[q] = fall < SLOWEST_FALL ? TAIL_SAFETY * term[q] * reach : Infinity;
		}
		last = term;
		const size = [Math.abs(sums[0]), Math.abs(sums[1])];
		const dead = [0, 1].every((q) => tail[q] <= TAIL_SHARE * accuracy * FIRST_STEP * size[q]);
		if ((i > 2 && dead) || i === MOST_NODES) return { sums, end: i * FIRST_STEP, tail };
	}
}

/** One node; v > 0 stands for both its signs. */
function addNode(
	plates: (separation: number) => PlateForces,
	separation: number,
	v: number,
	sums: Sums
): void {
	const cosh = Math.cosh(v);
	const { value, bound } = plates(separation * cosh * cosh);
	const weight = (v === 0 ? 1 : 2) * cosh;
	sums[0] += weight * value[1];
	sums[1] += weight * value[2];
	sums[2] += weight * bound[1];
	sums[3] += weight * bound[2];
	sums[4] += weight * Math.abs(value[1]);
	sums[5] += weight * Math.abs(value[2]);
}
