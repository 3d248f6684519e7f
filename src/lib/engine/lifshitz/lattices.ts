import { logLattice, type LogLattice } from '../numerics/log-lattice.ts';

/** Below the disc of analyticity nothing is known when n = 0: the lattice runs down in ln s to where it may be cut. */
const NO_DISC = 1e-30;

/** Floors of n = 0 lattices that are kept; they depend on the phase of the medium, so their number has no end. */
const KEPT_MAX = 64;

const ofFrequencies = new Map<string, LogLattice[]>();
const ofZero = new Map<string, LogLattice>();

/** Lattices of one step and cut, made when first asked for; they depend on nothing else, so all systems share them. */
export interface FrequencyLattices {
	step: number;
	/** Where the disc of analyticity has the radius 2^-index; odd ones are shifted by half a step. */
	at(index: number, odd: number): LogLattice;
}

export function frequencyLattices(step: number, cut: number): FrequencyLattices {
	const key = `${step}/${cut}`;
	const kept = ofFrequencies.get(key) ?? [];
	ofFrequencies.set(key, kept);
	// A small disc means that the integrand may live on it alone: what is left out there must be small against it.
	const make = (index: number, odd: number): LogLattice =>
		logLattice(step, 2 ** -index, cut, cut * 2 ** -index, odd / 2);
	return { step, at: (index, odd) => (kept[2 * index + odd] ??= make(index, odd)) };
}

/** A lattice of the n = 0 term, down to where s ds falls to `floor`. */
export function zeroLattice(step: number, cut: number, floor: number, odd: number): LogLattice {
	const key = `${step}/${cut}/${floor}/${odd}`;
	const known = ofZero.get(key) ?? logLattice(step, NO_DISC, cut, floor, odd / 2);
	if (ofZero.size >= KEPT_MAX) ofZero.clear();
	ofZero.set(key, known);
	return known;
}
