import type { Interfaces } from './recursion.ts';

/** Below this a layer takes so little off a wave that 1 - e^-x is the number to work with. */
const THIN = 0.5;

/** From here on front and back of a layer cancel enough that complements are the numbers to work with. */
const CANCELLING = -0.25;

/**
 * Reflection of a stack whose interfaces may be covered by a conducting sheet, from the back. A sheet does not reflect alike
 * from both sides, so it is not part of an interface: with A = 1 + rho and B = 1 - rho of all that lies behind it, and
 * c its admittance over that of the place in front,
 *
 *     1 + rho' = 2 (A + c B)/(2 + c B),  1 - rho' = 2 B/(2 + c B)      in TM, where A/B is the admittance seen,
 *
 * and with A and B exchanged in TE. All terms are positive, as in recursion.ts; the absolute error stays at roundoff.
 *
 * @param last    index of the last interface seen
 * @param x       2 kappa t of the layer behind interface b, index b
 * @param covers  c of the sheet in front of interface b, index b; 0 where there is none
 */
export function coveredFromBack(
	{ r, plus, minus }: Interfaces,
	last: number,
	x: Float64Array,
	covers: Float64Array,
	magnetic: boolean
): number {
	let rho = 0;
	let above = 1;
	let below = 1;
	for (let b = last; b >= 1; b--) {
		if (b === last) {
			rho = r[b];
			above = plus[b];
			below = minus[b];
		} else {
			let seen = rho * Math.exp(-x[b]);
			let seenAbove = 1 + seen;
			let seenBelow = 1 - seen;
			if (x[b] <= THIN) {
				const lost = rho * -Math.expm1(-x[b]);
				seen = rho - lost;
				seenAbove = above - lost;
				seenBelow = below + lost;
			}
			const A = plus[b] * seenAbove;
			const B = minus[b] * seenBelow;
			const sum = A + B;
			rho = r[b] * seen < CANCELLING ? (A - B) / sum : (2 * (r[b] + seen)) / sum;
			above = (2 * A) / sum;
			below = (2 * B) / sum;
		}
		if (covers[b] === 0) continue;
		const [admitted, refused] = magnetic ? [above, below] : [below, above];
		const added = covers[b] * refused;
		const size = 2 + added;
		const more = (2 * (admitted + added)) / size;
		const less = (2 * refused) / size;
		rho = magnetic ? (2 * rho + added) / size : (2 * rho - added) / size;
		above = magnetic ? more : less;
		below = magnetic ? less : more;
	}
	return rho;
}
