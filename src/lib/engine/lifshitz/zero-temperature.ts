import { SPEED_OF_LIGHT } from '../constants.ts';
import { roundTripTime, type System } from '../system.ts';
import { blockSum } from './block-sum.ts';
import { probeBlock, zeroTemperatureBlocks, type FrequencyBlock } from './frequency-blocks.ts';
import { gradeOf, type Level } from './level.ts';
import type { Quantities } from './polarization-sum.ts';
import { LARGEST_PHASE, tailJudge } from './tail.ts';
import { copyTally, restoreTally, shareOf, UNIT_ROUNDOFF, valueOf, type Tally } from './tally.ts';

/** Octaves above and below c/(2 d) that are tried at most; the lowest holds 2^-60 of the integral. */
const MOST_OCTAVES = 60;

/** A remainder next to xi = 0 is tried once the octave above it holds less than this many times the accuracy. */
const REMAINDER_TRIAL = 1e5;

/** A frequency this much below the lowest node stands for xi = 0. */
const AS_GOOD_AS_ZERO = 2 ** -50;

/** Error that the remainder may have, as a share of the accuracy asked for. */
const REMAINDER_SHARE = 0.1;

/**
 * T = 0: adds the integral over xi (rad/s) of the integrals over y to a tally. Octaves of xi from c/(2 d) upwards until
 * the tail no longer counts, then downwards until what is left next to xi = 0 can be taken in one piece.
 *
 * @returns (separation in m, relative accuracy, tally)
 */
export function zeroTemperatureIntegral(
	system: System,
	level: Level,
	quantities: Quantities
): (separation: number, accuracy: number, tally: Tally) => void {
	const blocks = zeroTemperatureBlocks(level, system.knots);
	const sum = blockSum(system, level, quantities);
	const octave = new Float64Array(3);
	const [first, second] = [new Float64Array(3), new Float64Array(3)];
	const probes = new Map<string, FrequencyBlock>();
	const probeAt = (xi: number, weight: number): FrequencyBlock => {
		const key = `${xi}/${weight}`;
		const known = probes.get(key) ?? probeBlock(xi, weight);
		probes.set(key, known);
		return known;
	};
	const addOctave = (k: number, separation: number, tally: Tally, grade: number): void => {
		octave.fill(0);
		for (const block of blocks.octave(k)) {
			sum.add(block, separation, tally, true, grade);
			for (let q = 0; q < 3; q++) octave[q] += sum.last[q];
		}
	};

	/** The block next to xi = 0, kept if its error is small; terms need not be analytic at that end. */
	const addRemainder = (k: number, separation: number, accuracy: number, tally: Tally): boolean => {
		const before = copyTally(tally);
		const grade = gradeOf(shareOf(tally, octave));
		for (const block of blocks.below(k)) sum.add(block, separation, tally, false, grade);
		// Relaxations far below the lowest node would pass unseen: what xi = 0 differs by may fill all the way to it.
		const lowest = blocks.below(k)[0].xi[0];
		sum.values(probeAt(lowest, 2 * lowest), separation, first);
		sum.values(probeAt(lowest * AS_GOOD_AS_ZERO, 2 * lowest), separation, second);
		for (let q = 0; q < 3; q++) tally.blocks[q] += Math.abs(first[q] - second[q]);
		const good = [0, 1, 2].every((q) => {
			const error = tally.blocks[q] - before.blocks[q];
			const wanted = REMAINDER_SHARE * accuracy * Math.abs(valueOf(tally, q));
			return error <= Math.max(wanted, UNIT_ROUNDOFF * tally.magnitude[q]);
		});
		if (!good) restoreTally(tally, before);
		return good;
	};

	const upwards = (middle: number, separation: number, accuracy: number, tally: Tally): void => {
		const judge = tailJudge();
		const time = roundTripTime(separation);
		let start = sum.startPhase(blocks.octave(middle)[0], separation);
		let grade = 0;
		for (let k = middle; k < middle + MOST_OCTAVES && 2 ** k * time < LARGEST_PHASE; k++) {
			addOctave(k, separation, tally, grade);
			grade = gradeOf(shareOf(tally, octave));
			const next = sum.startPhase(blocks.octave(k + 1)[0], separation);
			judge.octave(octave, start, next);
			start = next;
			if (!judge.smallEnough(tally, accuracy)) continue;
			sum.look(probeAt(2 ** (k + 1), 2 ** (k + 1)), separation, first);
			sum.look(probeAt(2 ** (k + 2), 2 ** (k + 2)), separation, second);
			judge.probe(first, second);
			if (!judge.smallEnough(tally, accuracy)) continue;
			for (let q = 0; q < 3; q++) tally.tail[q] += judge.tail(q);
			return;
		}
	};

	const downwards = (middle: number, separation: number, accuracy: number, tally: Tally): void => {
		const lowest = middle - MOST_OCTAVES;
		let grade = 0;
		for (let k = middle - 1; k > lowest; k--) {
			addOctave(k, separation, tally, grade);
			grade = gradeOf(shareOf(tally, octave));
			// Nothing yet: coatings that match the medium may hide the bodies down to much lower frequencies.
			if (tally.magnitude.every((size) => size === 0)) continue;
			const late = [0, 1, 2].every(
				(q) => octave[q] <= REMAINDER_TRIAL * accuracy * Math.abs(valueOf(tally, q))
			);
			if (late && (middle - k) % 2 === 0 && addRemainder(k, separation, accuracy, tally)) return;
		}
		// Nothing below can be larger than the octave above it.
		for (let q = 0; q < 3; q++) tally.tail[q] += 2 * octave[q];
	};

	return (separation, accuracy, tally) => {
		const middle = Math.floor(Math.log2(SPEED_OF_LIGHT / (2 * separation)));
		upwards(middle, separation, accuracy, tally);
		downwards(middle, separation, accuracy, tally);
	};
}
