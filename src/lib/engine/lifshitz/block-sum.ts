import { roundTripTime, type System } from '../system.ts';
import type { FrequencyBlock } from './frequency-blocks.ts';
import { frequencyTerms } from './frequency-terms.ts';
import type { Level } from './level.ts';
import type { Quantities } from './polarization-sum.ts';
import { clearTally, newTally, valueOf, type Tally } from './tally.ts';

/**
 * The error of an m-node Gauss rule over an octave: terms are analytic for Re xi > 0, so the coefficients c_j of a
 * block fall in the end at least like (3 + sqrt 8)^-j (Bernstein ellipse through xi = 0), and the rule errs by c_2m.
 * They are extrapolated from the last ones seen.
 */
const COEFFICIENT_FALL = 1 / (3 + Math.sqrt(8));

/** How coefficients fall: the last one seen over the two before it, and c_2m over the last one. */
interface Falls {
	one: number;
	two: number;
	beyond: number;
}

/** Degree of a double zero, where equal bodies match the medium at some frequency of the block. */
const DOUBLE_ZERO = 2;

/**
 * Falls for a function of the class above times a steep exponential e^-zx. Until the exponential has caught up with the
 * class its own expansion sets the pace: modified Bessel functions, I_{j+1/2}/I_{j-1/2} ~ z/(j + 1/2 + sqrt((j + 1/2)^2 + z^2)).
 *
 * @param z      fall of the logarithm of the terms across the block, a unit of x on (-1, 1)
 * @param early  degrees that a polynomial factor takes away from the exponential
 */
function fallsOf(nodes: number, z: number, early: number): Falls {
	const rate = (degree: number): number => {
		const j = Math.max(1, degree - early) + 0.5;
		return Math.max(COEFFICIENT_FALL, z / (j + Math.hypot(j, z)));
	};
	let beyond = 1;
	for (let j = nodes; j <= 2 * nodes; j++) beyond *= rate(j);
	const one = rate(nodes - 1);
	return { one, two: one * rate(nodes - 2), beyond };
}

/** How steeply terms fall: by their phases, or by themselves, where layers decay faster than the gap. */
function steepness(block: FrequencyBlock, phases: readonly number[], sizes: readonly number[]): number {
	const byPhase = phases[1] - phases[0];
	const bySize = sizes[1] > 0 ? Math.log(sizes[0] / sizes[1]) - POWER_FALL : STEEPEST;
	return Math.min(STEEPEST, Math.max(byPhase, bySize)) / block.reach;
}

/** A last coefficient this much below what those before it promise is passing through zero. */
const PASSING_ZERO = 0.2;

/** Beside a double zero coefficients come back this much larger from their own zero. */
const AFTER_ZERO = 8;

/** The last coefficient, or what the two before it promise: one alone may be small by chance. */
function lastCoefficient(projected: Float64Array, at: number, { one, two }: Falls, rising: boolean): number {
	const last = Math.abs(projected[at]);
	const promised = Math.max(one * Math.abs(projected[at + 1]), two * Math.abs(projected[at + 2]));
	if (rising && last < PASSING_ZERO * promised) return AFTER_ZERO * promised;
	return Math.max(last, promised);
}

/** Beyond this a block holds nothing but its first terms. */
const STEEPEST = 80;

/** An octave of xi^-4: falls like a power, which the class above holds already. */
const POWER_FALL = 4 * Math.LN2;

/** What polynomials beyond the last measured one may add together, over the geometric estimate. */
const BLOCK_SAFETY = 20;

/**
 * Beside a zero of steeply falling terms the coefficients seen may all be small at once; the worst of 10^4 random requests
 * missed by 4.4. Terms that have come back from a zero have grown by this much somewhere in the block.
 */
const ZERO_SAFETY = 6;
const COME_BACK = 1.5;

/** Where terms fall less than this the class above holds their zeros too. */
const STEEP = 2.5;

/** Next to xi = 0 the last coefficients themselves stand for the error: the rule is far better than that. */
const REMAINDER_SAFETY = 2;

/** Grade of terms that are only looked at for their size. */
const COARSEST = 3;

/** One block added to the tally; magnitudes of the block are left in `last`. */
export interface BlockSum {
	add(block: FrequencyBlock, separation: number, tally: Tally, extrapolate: boolean, grade: number): void;
	last: Float64Array;
	/** y0 at the first frequency of a block. */
	startPhase(block: FrequencyBlock, separation: number): number;
	/** Magnitudes that a block would add, into `out`; nothing is summed. */
	look(block: FrequencyBlock, separation: number, out: Float64Array): void;
	/** Values that a block would add, TE and TM together, into `out`. */
	values(block: FrequencyBlock, separation: number, out: Float64Array): void;
}

/** Adds up blocks of frequencies of one system at one level. */
export function blockSum(system: System, level: Level, quantities: Quantities): BlockSum {
	const { terms, at, phaseOf } = frequencyTerms(system, level, quantities);
	const { te: teOf, tm: tmOf, lattice: openOf, rounding: noiseOf } = terms;
	const aside = newTally();
	/** The quantity by which the fall of terms is judged. */
	const gauge = quantities === 'all' ? 0 : 1;
	const last = new Float64Array(3);
	const projected = new Float64Array(18);
	const phases = [0, 0];
	const sizes = [0, 0];
	const add = (
		block: FrequencyBlock,
		separation: number,
		tally: Tally,
		extrapolate: boolean,
		grade: number
	): void => {
		const time = roundTripTime(separation);
		const { exact, xi, weight } = block;
		const { parts, lattice, rounding } = tally;
		const [first, second, third] = block.projections;
		for (let q = 0; q < 3; q++) last[q] = 0;
		if (!exact) projected.fill(0);
		// Terms that grow inside a block have passed a zero, or will not be steep.
		let rising = false;
		let comingBack = false;
		let lowest = Infinity;
		for (let i = 0; i < xi.length; i++) {
			at(block, i, separation, time, grade);
			phases[1] = terms.phase;
			const size = Math.abs(terms.te[gauge]) + Math.abs(terms.tm[gauge]);
			rising ||= i > 0 && size > sizes[1];
			comingBack ||= size > COME_BACK * lowest;
			lowest = Math.min(lowest, size);
			sizes[1] = size;
			if (i === 0) {
				phases[0] = phases[1];
				sizes[0] = sizes[1];
			}
			const w = weight[i];
			for (let q = 0; q < 3; q++) {
				const te = teOf[q];
				const tm = tmOf[q];
				parts[4 * q + 2] += w * te;
				parts[4 * q + 3] += w * tm;
				last[q] += w * (Math.abs(te) + Math.abs(tm));
				lattice[q] += w * openOf[q];
				rounding[q] += w * noiseOf[q];
			}
			if (exact) continue;
			const a = first[i];
			const b = second[i];
			const c = third[i];
			for (let q = 0; q < 3; q++) {
				const te = teOf[q];
				const tm = tmOf[q];
				projected[6 * q] += a * te;
				projected[6 * q + 1] += b * te;
				projected[6 * q + 2] += c * te;
				projected[6 * q + 3] += a * tm;
				projected[6 * q + 4] += b * tm;
				projected[6 * q + 5] += c * tm;
			}
		}
		tally.evaluations += terms.evaluations;
		terms.evaluations = 0;
		for (let q = 0; q < 3; q++) tally.magnitude[q] += last[q];
		if (exact) return;
		const early = rising ? DOUBLE_ZERO : 0;
		const steep = steepness(block, phases, sizes);
		const falls = fallsOf(block.xi.length, steep, early);
		const beside = comingBack && steep > STEEP ? ZERO_SAFETY : 1;
		const safety = extrapolate ? BLOCK_SAFETY * beside * falls.beyond : REMAINDER_SAFETY;
		for (let q = 0; q < 3; q++) {
			const te = lastCoefficient(projected, 6 * q, falls, rising);
			const tm = lastCoefficient(projected, 6 * q + 3, falls, rising);
			tally.blocks[q] += safety * (te + tm);
		}
	};
	const startPhase = (block: FrequencyBlock, separation: number): number =>
		phaseOf(block, 0, roundTripTime(separation));
	const look = (block: FrequencyBlock, separation: number, out: Float64Array): void => {
		clearTally(aside);
		add(block, separation, aside, true, COARSEST);
		for (let q = 0; q < 3; q++) out[q] = last[q];
	};
	const values = (block: FrequencyBlock, separation: number, out: Float64Array): void => {
		clearTally(aside);
		add(block, separation, aside, true, 0);
		for (let q = 0; q < 3; q++) out[q] = valueOf(aside, q);
	};
	return { add, startPhase, look, values, last };
}
