import { roundTripTime, type System } from '../system.ts';
import type { FrequencyBlock } from './frequency-blocks.ts';
import { frequencyTerms } from './frequency-terms.ts';
import type { Level } from './level.ts';
import { newTally, valueOf, type Tally } from './tally.ts';

/**
 * The error of an m-node Gauss rule over an octave: terms are analytic for Re xi > 0, so the coefficients c_j of a
 * block fall in the end at least like (3 + sqrt 8)^-j (Bernstein ellipse through xi = 0), and the rule errs by c_2m.
 * They are extrapolated from the last ones seen.
 */
const COEFFICIENT_FALL = 1 / (3 + Math.sqrt(8));

/**
 * c_2m over c_{m-1}. Where e^-y0 falls steeply across a block, y0 changing by z a unit of x, its own expansion sets the
 * pace until it has caught up: modified Bessel functions, I_{j+1/2}/I_{j-1/2} ~ z/(j + 1/2 + sqrt((j + 1/2)^2 + z^2)).
 */
function fallBeyond(block: FrequencyBlock, [first, last]: [number, number]): number {
	const nodes = block.xi.length;
	const z = (STEEPNESS * (last - first)) / block.reach;
	let product = 1;
	for (let j = nodes; j <= 2 * nodes; j++) {
		product *= Math.max(COEFFICIENT_FALL, z / (j + 0.5 + Math.hypot(j + 0.5, z)));
	}
	return product;
}

/** The last coefficient, or what the two before it promise: one alone may be small by chance. */
function lastCoefficients(projected: Float64Array, at: number): number {
	const [c1, c2, c3] = [projected[at], projected[at + 1], projected[at + 2]];
	return Math.max(Math.abs(c1), COEFFICIENT_FALL * Math.abs(c2), COEFFICIENT_FALL ** 2 * Math.abs(c3));
}

/** The powers of y0 beside e^-y0, and layers that decay faster, make a block a little steeper than its phase says. */
const STEEPNESS = 1.2;

/** What polynomials beyond the last measured one may add together, over the geometric estimate. */
const BLOCK_SAFETY = 16;

/** Next to xi = 0 the last coefficients themselves stand for the error: the rule is far better than that. */
const REMAINDER_SAFETY = 2;

/** One block added to the tally; magnitudes of the block are left in `last`. */
export interface BlockSum {
	add(block: FrequencyBlock, separation: number, tally: Tally, extrapolate: boolean): void;
	last: Float64Array;
	/** y0 at the first frequency of a block. */
	startPhase(block: FrequencyBlock, separation: number): number;
	/** Magnitudes that a block would add, into `out`; nothing is summed. */
	look(block: FrequencyBlock, separation: number, out: Float64Array): void;
	/** Values that a block would add, TE and TM together, into `out`. */
	values(block: FrequencyBlock, separation: number, out: Float64Array): void;
}

/** Adds up blocks of frequencies of one system at one level. */
export function blockSum(system: System, level: Level): BlockSum {
	const { terms, at, phaseOf } = frequencyTerms(system, level);
	const last = new Float64Array(3);
	const projected = new Float64Array(18);
	const phases: [number, number] = [0, 0];
	const add = (block: FrequencyBlock, separation: number, tally: Tally, extrapolate: boolean): void => {
		const time = roundTripTime(separation);
		last.fill(0);
		projected.fill(0);
		for (let i = 0; i < block.xi.length; i++) {
			at(block, i, separation, time);
			if (i === 0) phases[0] = terms.phase;
			phases[1] = terms.phase;
			const w = block.weight[i];
			for (let q = 0; q < 3; q++) {
				const te = terms.te[q];
				const tm = terms.tm[q];
				tally.parts[4 * q + 2] += w * te;
				tally.parts[4 * q + 3] += w * tm;
				last[q] += w * (Math.abs(te) + Math.abs(tm));
				tally.lattice[q] += w * terms.lattice[q];
				tally.rounding[q] += w * terms.rounding[q];
				if (block.exact) continue;
				for (let j = 0; j < 3; j++) {
					projected[6 * q + j] += block.projections[j][i] * te;
					projected[6 * q + 3 + j] += block.projections[j][i] * tm;
				}
			}
		}
		tally.evaluations += terms.evaluations;
		terms.evaluations = 0;
		const beyond = block.exact ? 0 : fallBeyond(block, phases);
		for (let q = 0; q < 3; q++) {
			tally.magnitude[q] += last[q];
			if (block.exact) continue;
			const size = lastCoefficients(projected, 6 * q) + lastCoefficients(projected, 6 * q + 3);
			tally.blocks[q] += extrapolate ? BLOCK_SAFETY * size * beyond : REMAINDER_SAFETY * size;
		}
	};
	const startPhase = (block: FrequencyBlock, separation: number): number =>
		phaseOf(block, 0, roundTripTime(separation));
	const look = (block: FrequencyBlock, separation: number, out: Float64Array): void => {
		add(block, separation, newTally(), true);
		out.set(last);
	};
	const values = (block: FrequencyBlock, separation: number, out: Float64Array): void => {
		const aside = newTally();
		add(block, separation, aside, true);
		for (let q = 0; q < 3; q++) out[q] = valueOf(aside, q);
	};
	return { add, startPhase, look, values, last };
}
