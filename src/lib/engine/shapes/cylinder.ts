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

/** Where cosh^-5 v, the slowest fall of the integrand (P like d^-3), has died. */
const reach = (accuracy: number): number => Math.log(4 / accuracy) / 5 + 0.6;

/** The rule's error falls quadratically with each halving; the difference is that of the cruder rule. */
const DIFFERENCE_SHARE = 0.05;

/**
 * Cylinder and plate, or parallel cylinders, per unit length (methods.md section 5), parabola to infinity:
 *
 *     sqrt(2 R d) int P(d (1 + s^2)) ds,   s = sinh v,   trapezoidal rule in v, even in v
 *
 * The integrand is analytic for |Im v| < pi/2 and falls at least like cosh^-5 v.
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
	const end = reach(accuracy);
	let sums = [0, 0, 0, 0];
	let before = [0, 0];
	let step = FIRST_STEP;
	for (let halving = 0; ; halving++) {
		const added =
			halving === 0
				? addNodes(plates, separation, 0, step, end)
				: addNodes(plates, separation, step, 2 * step, end);
		sums = sums.map((sum, i) => sum + added[i]);
		const now = [sums[0] * step, sums[1] * step];
		const shift = [0, 1].map((i) => Math.abs(now[i] - before[i]) * DIFFERENCE_SHARE);
		const tail = [accuracy / 20, accuracy / 20].map((share, i) => share * Math.abs(now[i]));
		const done = halving > 0 && shift.every((one, i) => one <= 0.2 * accuracy * Math.abs(now[i]));
		if (done || halving === MOST_HALVINGS) {
			return {
				force: scale * now[0],
				gradient: scale * now[1],
				forceBound: scale * (shift[0] + tail[0] + sums[2] * step),
				gradientBound: scale * (shift[1] + tail[1] + sums[3] * step)
			};
		}
		before = now;
		step /= 2;
	}
}

/** Sums of P, dP/dd and their bounds over v = first, first + stride, ...; both signs of v counted. */
function addNodes(
	plates: (separation: number) => PlateForces,
	separation: number,
	first: number,
	stride: number,
	end: number
): number[] {
	const sums = [0, 0, 0, 0];
	for (let v = first; v <= end; v += stride) {
		const cosh = Math.cosh(v);
		const { value, bound } = plates(separation * cosh * cosh);
		const weight = (v === 0 ? 1 : 2) * cosh;
		sums[0] += weight * value[1];
		sums[1] += weight * value[2];
		sums[2] += weight * bound[1];
		sums[3] += weight * bound[2];
	}
	return sums;
}
