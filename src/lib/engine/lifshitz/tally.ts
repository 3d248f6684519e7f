/** Half a unit in the last place of one. */
export const UNIT_ROUNDOFF = 2 ** -53;

/**
 * Free energy, pressure and gradient, in this order: sums of one separation in the reduced units of methods.md section 1, and what may be wrong
 * with them.
 */
export interface Tally {
	/** For each quantity: zero TE, zero TM, TE, TM. */
	parts: Float64Array;
	/** Sum of magnitudes: what cancellation is measured against. */
	magnitude: Float64Array;
	/** Error of the integrals over y. */
	lattice: Float64Array;
	/** Error of the Gauss rules over blocks of frequencies. */
	blocks: Float64Array;
	/** Terms left out. */
	tail: Float64Array;
	/** Rounding, of the sums and of the permittivities. */
	rounding: Float64Array;
	/** Integrands evaluated. */
	evaluations: number;
}

export const newTally = (): Tally => ({
	parts: new Float64Array(12),
	magnitude: new Float64Array(3),
	lattice: new Float64Array(3),
	blocks: new Float64Array(3),
	tail: new Float64Array(3),
	rounding: new Float64Array(3),
	evaluations: 0
});

export function valueOf(tally: Tally, quantity: number): number {
	const { parts } = tally;
	const at = 4 * quantity;
	return parts[at] + parts[at + 1] + (parts[at + 2] + parts[at + 3]);
}

/** The largest share that these magnitudes have in a sum; one where there is nothing yet. */
export function shareOf(tally: Tally, sizes: Float64Array): number {
	let share = 0;
	for (let q = 0; q < 3; q++) {
		const value = Math.abs(valueOf(tally, q));
		if (sizes[q] > 0) share = Math.max(share, sizes[q] < value ? sizes[q] / value : 1);
	}
	return share > 0 ? share : 1;
}

const FIELDS = ['parts', 'magnitude', 'lattice', 'blocks', 'tail', 'rounding'] as const;

export function clearTally(tally: Tally): void {
	for (const field of FIELDS) tally[field].fill(0);
}

/** What a tally holds now, to go back to. */
export function copyTally(tally: Tally): Tally {
	const copy = newTally();
	for (const field of FIELDS) copy[field].set(tally[field]);
	return copy;
}

/** Sums as they were; what has been evaluated stays counted. */
export function restoreTally(tally: Tally, before: Tally): void {
	for (const field of FIELDS) tally[field].set(before[field]);
}
