import { setImmediate as nextTurn } from 'node:timers/promises';
import { and, asc, eq, isNotNull } from 'drizzle-orm';
import { rankedGroups, type Ranking } from '../../screening/ranking.ts';
import type { Criterion, ScreeningPlan } from '../../schemas/screening.ts';
import { database } from '../db/client.ts';
import { screeningChunk } from '../db/schema/screening.ts';

/** Results of a screening as one matrix, read once and ranked once; what still runs is read anew as it grows. */

export interface Results {
	/** Cells in order, each with its pressures at every separation, Pa; NaN: not there, refused, or as by the first rule. */
	pressures: Float64Array;
	bounds: Float32Array;
	/** By cell: whether it is computed. */
	done: Uint8Array;
}

const KEPT_BYTES = 256 * 2 ** 20;

interface Kept {
	key: string;
	results: Results;
	ranking: Ranking;
	bytes: number;
}

const kept = new Map<string, Kept>();

interface Asked {
	id: string;
	plan: ScreeningPlan;
	criterion: Criterion;
	chunksDone: number;
	cells: number;
}

/** @returns the matrix with its ranking, kept while nothing new was computed */
export async function resultsOf(asked: Asked): Promise<{ results: Results; ranking: Ranking }> {
	const key = `${asked.chunksDone} ${JSON.stringify(asked.criterion)}`;
	const known = kept.get(asked.id);
	if (known?.key === key) {
		// The one that was used last goes last.
		kept.delete(asked.id);
		kept.set(asked.id, known);
		return known;
	}
	const results = await read(asked);
	const ranking = await rankedGroups(asked.plan, asked.criterion, results, nextTurn);
	const bytes = results.pressures.byteLength + results.bounds.byteLength;
	kept.delete(asked.id);
	kept.set(asked.id, { key, results, ranking, bytes });
	let total = [...kept.values()].reduce((sum, one) => sum + one.bytes, 0);
	for (const [id, one] of kept) {
		if (total <= KEPT_BYTES || id === asked.id) break;
		kept.delete(id);
		total -= one.bytes;
	}
	return { results, ranking };
}

/** Chunks are read some at a time, so that a large screening never stands in memory twice. */
const CHUNKS_AT_ONCE = 200;

async function read({ id, plan, cells }: Asked): Promise<Results> {
	const count = plan.separationsNm.length;
	const results: Results = {
		pressures: new Float64Array(cells * count).fill(NaN),
		bounds: new Float32Array(cells * count),
		done: new Uint8Array(cells)
	};
	for (let offset = 0; ; offset += CHUNKS_AT_ONCE) {
		const chunks = await database()
			.select()
			.from(screeningChunk)
			.where(and(eq(screeningChunk.screeningId, id), isNotNull(screeningChunk.doneAt)))
			.orderBy(asc(screeningChunk.position))
			.limit(CHUNKS_AT_ONCE)
			.offset(offset);
		for (const { fromCell, toCell, pressures, bounds } of chunks) {
			if (!pressures || !bounds) continue;
			// Copied: the bytes of the driver need not lie where a float may begin.
			results.pressures.set(new Float64Array(new Uint8Array(pressures).buffer), fromCell * count);
			results.bounds.set(new Float32Array(new Uint8Array(bounds).buffer), fromCell * count);
			results.done.fill(1, fromCell, toCell);
		}
		if (chunks.length < CHUNKS_AT_ONCE) return results;
		await nextTurn();
	}
}
