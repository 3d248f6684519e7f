/** Most interfaces of one stack: the layers of the contract and the substrate, with room. */
export const MOST_INTERFACES = 48;

/** Below this loss, 1 - e^-x at x = 1/2, a layer takes so little off a wave that the loss is the number to work with. */
export const THIN = 0.39346934028736658;

/** From here on front and back of a layer cancel enough that complements are the numbers to work with. */
export const CANCELLING = -0.25;

/** Interfaces of one stack at one frequency and wave number, index 1 next to the gap. */
export interface Interfaces {
	/** r, 1 + r and 1 - r: the last two as quotients of their own, so that r next to +-1 loses nothing. */
	r: Float64Array;
	plus: Float64Array;
	minus: Float64Array;
}

export const interfaces = (): Interfaces => ({
	r: new Float64Array(MOST_INTERFACES),
	plus: new Float64Array(MOST_INTERFACES),
	minus: new Float64Array(MOST_INTERFACES)
});

/**
 * Reflection of a stack from its interfaces (methods.md section 3), from the back:
 *
 *     rho' = (r + rho e)/(1 + r rho e),   e = exp(-x),   x = 2 kappa t
 *
 * With A = (1 + r)(1 + rho e) and B = (1 - r)(1 - rho e), both positive, the same is (A - B)/(A + B), and 1 +- rho' are
 * 2A/(A + B) and 2B/(A + B): the way through thin films of good conductors, where 1 + r rho e is itself a small
 * difference. The absolute error stays at roundoff.
 *
 * @param last  index of the last interface seen
 * @param kept  e^-x of the layer behind interface b, index b, x = 2 kappa t
 * @param lost  1 - e^-x of the same layer
 */
export function reflectionFromBack(
	{ r, plus, minus }: Interfaces,
	last: number,
	kept: Float64Array,
	lost: Float64Array
): number {
	let rho = r[last];
	let above = plus[last];
	let below = minus[last];
	for (let b = last - 1; b >= 1; b--) {
		let seen: number;
		let seenAbove: number;
		let seenBelow: number;
		if (lost[b] > THIN) {
			seen = rho * kept[b];
			seenAbove = 1 + seen;
			seenBelow = 1 - seen;
		} else {
			const less = rho * lost[b];
			seen = rho - less;
			seenAbove = above - less;
			seenBelow = below + less;
		}
		const A = plus[b] * seenAbove;
		const B = minus[b] * seenBelow;
		const twice = 2 / (A + B);
		const front = r[b];
		rho = front * seen < CANCELLING ? ((A - B) / 2) * twice : (front + seen) * twice;
		above = A * twice;
		below = B * twice;
	}
	return rho;
}
