import { logLattice, type LogLattice } from '../numerics/log-lattice.ts';
import { LEVELS, type Level } from './level.ts';

/** Below the disc of analyticity nothing is known when n = 0: the lattice runs down in ln s to where it may be cut. */
const NO_DISC = 1e-30;

/** Floors of n = 0 lattices that are kept; they depend on the phase of the medium, so their number has no end. */
const KEPT_MAX = 64;

const ofFrequencies = new Map<Level, LogLattice[]>(LEVELS.map((level) => [level, []]));
const ofZero = new Map<string, LogLattice>();

/**
 * The lattice of a frequency term whose disc of analyticity has the radius 2^-index. Lattices depend on nothing but the
 * level, so all systems share them.
 */
export function frequencyLattice(level: Level, index: number, odd: number): LogLattice {
	const kept = ofFrequencies.get(level) ?? [];
	return (kept[2 * index + odd] ??= logLattice(level.step, 2 ** -index, level.cut, level.cut, odd / 2));
}

/** A lattice of the n = 0 term down to where s ds falls to `floor`. */
export function zeroLattice(level: Level, floor: number, odd: number): LogLattice {
	const key = `${level.step}/${floor}/${odd}`;
	const known = ofZero.get(key) ?? logLattice(level.step, NO_DISC, level.cut, floor, odd / 2);
	if (ofZero.size >= KEPT_MAX) ofZero.clear();
	ofZero.set(key, known);
	return known;
}
