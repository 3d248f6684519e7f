import { roundTripTime, type System } from '../system.ts';
import { blockSum } from './block-sum.ts';
import { matsubaraBlocks, probeBlock, type FrequencyBlock } from './frequency-blocks.ts';
import { gradeOf, type Level } from './level.ts';
import { matsubaraFrequency } from './matsubara.ts';
import type { Quantities } from './polarization-sum.ts';
import { LARGEST_PHASE, tailJudge } from './tail.ts';
import { shareOf, type Tally } from './tally.ts';

/**
 * Adds all terms n >= 1 (T > 0) to a tally, octave by octave until the tail no longer counts (methods.md section 9).
 *
 * @returns (separation in m, relative accuracy, tally); made once a system, so that eps(i xi) serves every separation
 */
export function matsubaraSum(
	system: System,
	level: Level,
	quantities: Quantities
): (separation: number, accuracy: number, tally: Tally) => void {
	const blockAt = matsubaraBlocks(level, system.temperature, system.knots);
	const sum = blockSum(system, level, quantities);
	const octave = new Float64Array(3);
	const [first, second] = [new Float64Array(3), new Float64Array(3)];
	const probes = new Map<number, FrequencyBlock>();
	/** The term n, weighing as much as the octave that it begins. */
	const probeAt = (n: number): FrequencyBlock => {
		const known = probes.get(n) ?? probeBlock(matsubaraFrequency(n, system.temperature), n);
		probes.set(n, known);
		return known;
	};
	return (separation, accuracy, tally) => {
		const time = roundTripTime(separation);
		const judge = tailJudge();
		octave.fill(0);
		let next = 1;
		let grade = 0;
		let start = sum.startPhase(blockAt(0), separation);
		for (let index = 0; blockAt(index).xi[0] * time < LARGEST_PHASE; index++) {
			const block = blockAt(index);
			sum.add(block, separation, tally, true, grade);
			for (let q = 0; q < 3; q++) octave[q] += sum.last[q];
			if (!block.closesOctave) continue;
			next *= 2;
			const following = sum.startPhase(blockAt(index + 1), separation);
			judge.octave(octave, start, following);
			grade = gradeOf(shareOf(tally, octave));
			octave.fill(0);
			start = following;
			if (!judge.smallEnough(tally, accuracy)) continue;
			sum.look(probeAt(next), separation, first);
			sum.look(probeAt(2 * next), separation, second);
			judge.probe(first, second);
			if (!judge.smallEnough(tally, accuracy)) continue;
			for (let q = 0; q < 3; q++) tally.tail[q] += judge.tail(q);
			return;
		}
	};
}
