import { SPEED_OF_LIGHT } from '../constants.ts';
import { roundTripTime, type System } from '../system.ts';
import { matsubaraBlocks, zeroTemperatureBlocks, type FrequencyBlock } from './frequency-blocks.ts';
import { frequencyTerms } from './frequency-terms.ts';
import type { Level } from './level.ts';
import { valueOf, type Tally } from './tally.ts';

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

/** The sum ends where its tail is this share of the accuracy asked for, or of the rounding of all terms. */
const TAIL_SHARE = 0.05;
const TAIL_ROUNDING = 2 ** -56;

/** Beyond this y0 every exponential is zero in double precision. */
const LARGEST_PHASE = 745;

/** Tails are judged by the fall of magnitude from octave to octave, never trusted to fall faster than this. */
const FASTEST_FALL = 0.02;
const TAIL_SAFETY = 6;

/** One block added to the tally; magnitudes of the block and the largest phase reached are left in `last`. */
interface BlockSum {
	add(block: FrequencyBlock, separation: number, tally: Tally, extrapolate: boolean): void;
	last: Float64Array;
	/** Error estimates of the block just added. */
	error: Float64Array;
}

function blockSum(system: System, level: Level): BlockSum {
	const { terms, at } = frequencyTerms(system, level);
	const last = new Float64Array(3);
	const error = new Float64Array(3);
	const projected = new Float64Array(18);
	const phases: [number, number] = [0, 0];
	const add = (block: FrequencyBlock, separation: number, tally: Tally, extrapolate: boolean): void => {
		const time = roundTripTime(separation);
		last.fill(0);
		error.fill(0);
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
			error[q] = BLOCK_SAFETY * size * (extrapolate ? beyond : 1);
			tally.blocks[q] += error[q];
		}
	};
	return { add, last, error };
}

/** Sizes of the last three octaves, and what may follow them. */
function tailJudge(): { octave(size: Float64Array): void; tail(q: number): number } {
	const sizes = [new Float64Array(3), new Float64Array(3), new Float64Array(3)];
	let seen = 0;
	return {
		octave(size) {
			sizes[2].set(sizes[1]);
			sizes[1].set(sizes[0]);
			sizes[0].set(size);
			seen++;
		},
		tail(q) {
			const [now, before, earlier] = sizes.map((size) => size[q]);
			if (now === 0 && before === 0) return seen >= 2 ? 0 : Infinity;
			if (seen < 3) return Infinity;
			// A sign change inside the last octave must not pass for a fast fall: the fall before it counts half.
			const fall = Math.max(FASTEST_FALL, now / before, before / earlier / 2);
			return fall < 0.9 ? (TAIL_SAFETY * now * fall) / (1 - fall) : Infinity;
		}
	};
}

function smallEnough(judge: ReturnType<typeof tailJudge>, tally: Tally, accuracy: number): boolean {
	for (let q = 0; q < 3; q++) {
		const allowed = Math.max(
			TAIL_SHARE * accuracy * Math.abs(valueOf(tally, q)),
			TAIL_ROUNDING * tally.magnitude[q]
		);
		if (!(judge.tail(q) <= allowed)) return false;
	}
	return true;
}

/** Adds all terms n >= 1 (T > 0) to the tally: sum over n of the integrals over y. */
export function matsubaraSum(
	system: System,
	level: Level
): (separation: number, accuracy: number, tally: Tally) => void {
	const blockAt = matsubaraBlocks(level, system.temperature, system.knots);
	const sum = blockSum(system, level);
	const octave = new Float64Array(3);
	return (separation, accuracy, tally) => {
		const time = roundTripTime(separation);
		const judge = tailJudge();
		octave.fill(0);
		for (let index = 0; ; index++) {
			const block = blockAt(index);
			if (block.xi[0] * time > LARGEST_PHASE) break;
			sum.add(block, separation, tally, true);
			for (let q = 0; q < 3; q++) octave[q] += sum.last[q];
			if (!block.closesOctave) continue;
			judge.octave(octave);
			octave.fill(0);
			if (smallEnough(judge, tally, accuracy)) {
				for (let q = 0; q < 3; q++) tally.tail[q] += judge.tail(q);
				break;
			}
		}
	};
}

/** Octaves above and below c/(2 d) that are tried at most; the lowest holds 2^-60 of the integral. */
const MOST_OCTAVES = 60;

/** A remainder next to xi = 0 is tried once the octave above it holds less than this many times the accuracy. */
const REMAINDER_TRIAL = 1e5;

/** T = 0: adds the integral over xi (rad/s) of the integrals over y to the tally. */
export function zeroTemperatureIntegral(
	system: System,
	level: Level
): (separation: number, accuracy: number, tally: Tally) => void {
	const blocks = zeroTemperatureBlocks(level, system.knots);
	const sum = blockSum(system, level);
	const octave = new Float64Array(3);
	const addOctave = (k: number, separation: number, tally: Tally): void => {
		octave.fill(0);
		for (const block of blocks.octave(k)) {
			sum.add(block, separation, tally, true);
			for (let q = 0; q < 3; q++) octave[q] += sum.last[q];
		}
	};
	return (separation, accuracy, tally) => {
		const time = roundTripTime(separation);
		const middle = Math.floor(Math.log2(SPEED_OF_LIGHT / (2 * separation)));
		const judge = tailJudge();
		for (let k = middle; k < middle + MOST_OCTAVES; k++) {
			if (2 ** k * time > LARGEST_PHASE) break;
			addOctave(k, separation, tally);
			judge.octave(octave);
			if (smallEnough(judge, tally, accuracy)) {
				for (let q = 0; q < 3; q++) tally.tail[q] += judge.tail(q);
				break;
			}
		}
		for (let k = middle - 1; k > middle - MOST_OCTAVES; k--) {
			addOctave(k, separation, tally);
			const allowed = Math.min(...[0, 1, 2].map((q) => (accuracy * Math.abs(valueOf(tally, q))) / octave[q]));
			const early = !(REMAINDER_TRIAL * allowed > 1) || (middle - k) % 2 === 1;
			if (k > middle - MOST_OCTAVES + 1 && early) continue;
			if (addRemainder(k, separation, accuracy, tally) || k === middle - MOST_OCTAVES + 1) break;
		}
	};

	/** The block next to xi = 0, kept if its error is small; there the terms need not be analytic at the end. */
	function addRemainder(k: number, separation: number, accuracy: number, tally: Tally): boolean {
		const before = {
			parts: tally.parts.slice(),
			blocks: tally.blocks.slice(),
			magnitude: tally.magnitude.slice()
		};
		const others = { lattice: tally.lattice.slice(), rounding: tally.rounding.slice() };
		const error = new Float64Array(3);
		for (const block of blocks.below(k)) {
			sum.add(block, separation, tally, false);
			for (let q = 0; q < 3; q++) error[q] += sum.error[q];
		}
		const good = [0, 1, 2].every(
			(q) => error[q] <= Math.max(0.1 * accuracy * Math.abs(valueOf(tally, q)), 2 ** -53 * tally.magnitude[q])
		);
		if (good || k <= middleLimit(separation)) return true;
		tally.parts.set(before.parts);
		tally.blocks.set(before.blocks);
		tally.magnitude.set(before.magnitude);
		tally.lattice.set(others.lattice);
		tally.rounding.set(others.rounding);
		return false;
	}
}

const middleLimit = (separation: number): number =>
	Math.floor(Math.log2(SPEED_OF_LIGHT / (2 * separation))) - MOST_OCTAVES + 1;
