import { createHash } from 'node:crypto';
import { hostname } from 'node:os';
import { setImmediate as nextTurn } from 'node:timers/promises';
import { and, eq, isNull, sql } from 'drizzle-orm';
import type { MaterialModel, PermittivityModel } from '../../engine/contract.ts';
import { Refusal } from '../../engine/index.ts';
import { screeningKernel, type ScreeningKernel } from '../../engine/screening.ts';
import { cellAt, ruleMatters, type Cell } from '../../screening/cells.ts';
import type { PlanPart, ScreeningPlan } from '../../schemas/screening.ts';
import { now } from '../clock.ts';
import { database, type Transaction } from '../db/client.ts';
import { screening, screeningChunk } from '../db/schema/screening.ts';
import type { ChunkJob } from '../jobs/queue.ts';
import { tell } from '../library/tell.ts';
import * as versions from '../library/versions.ts';

/** The worker's side of a screening: one chunk computed, and stored in one transaction with its completion. */

/** How long is computed without looking whether the screening was cancelled. */
const SLICE_MS = 40;
const LOOK_MS = 400;
/** Above this its owner is told of the end. */
const LONG_SECONDS = 30;
const PLANS_KEPT = 4;

interface Prepared {
	plan: ScreeningPlan;
	models: PermittivityModel[];
	/** One a rule and temperature, made when first needed: each holds eps(i xi) of every material at its temperature. */
	kernels: Map<string, ScreeningKernel>;
}

const prepared = new Map<string, Prepared>();

/** The versions that the plan names, as the library has them; what was withdrawn since keeps its model. */
async function prepare(id: string, plan: ScreeningPlan): Promise<Prepared> {
	const known = prepared.get(id);
	if (known) return known;
	const models: PermittivityModel[] = [];
	const refs = plan.materials.map(({ ref }) => ref);
	for (let start = 0; start < refs.length; start += versions.RESOLVE_MAX) {
		const some = refs.slice(start, start + versions.RESOLVE_MAX);
		const found = await versions.resolve(some);
		for (const ref of some) {
			const resolved = found.get(ref);
			if (!resolved) throw new Error(`The version ${ref} of the plan is not in the library.`);
			models.push(resolved.model);
		}
	}
	const made = { plan, models, kernels: new Map<string, ScreeningKernel>() };
	if (prepared.size >= PLANS_KEPT) prepared.delete([...prepared.keys()][0]);
	prepared.set(id, made);
	return made;
}

function kernelFor({ plan, models, kernels }: Prepared, { rule, temperature }: Cell): ScreeningKernel {
	const key = `${rule} ${temperature}`;
	const known = kernels.get(key);
	if (known) return known;
	const wanted = plan.rules[rule];
	const materials = models.map((permittivity, place): MaterialModel => {
		const takesRule = wanted !== 'written' && plan.materials[place].conducts;
		return takesRule && permittivity.kind !== 'idealConductor'
			? { permittivity, zeroFrequency: wanted }
			: { permittivity };
	});
	const made = screeningKernel(materials, plan.temperaturesK[temperature], plan.relativeAccuracy);
	// Chunks run through temperatures in order, so an old kernel is not needed again.
	if (kernels.size >= 2) kernels.delete([...kernels.keys()][0]);
	kernels.set(key, made);
	return made;
}

const bodyOf = ({ of, coating }: PlanPart) => ({
	layers: coating ? [{ of: coating.of, thicknessNm: coating.thicknessNm }] : [],
	substrate: of
});

interface Computed {
	pressures: Float64Array;
	bounds: Float32Array;
}

/** A bound must not become smaller when it is kept in 32 bits. */
function upwards(value: number): number {
	const rounded = Math.fround(value);
	return rounded >= value ? rounded : Math.fround(value * (1 + 2 ** -22));
}

function computeCell(from: Prepared, index: number, into: Computed, offset: number): void {
	const { plan } = from;
	const count = plan.separationsNm.length;
	const cell = cellAt(plan, index);
	if (cell.rule > 0 && !ruleMatters(plan, cell)) {
		// The first rule's numbers stand for it.
		into.pressures.fill(NaN, offset, offset + count);
		into.bounds.fill(0, offset, offset + count);
		return;
	}
	try {
		const triple = {
			left: bodyOf(plan.left[cell.left]),
			medium: plan.media[cell.medium].of,
			right: bodyOf(plan.right[cell.right])
		};
		kernelFor(from, cell)
			.pressures(triple, plan.separationsNm)
			.forEach(({ pressurePa, errorBound }, place) => {
				into.pressures[offset + place] = pressurePa;
				into.bounds[offset + place] = upwards(errorBound);
			});
	} catch (error) {
		if (!(error instanceof Refusal)) throw error;
		into.pressures.fill(NaN, offset, offset + count);
		into.bounds.fill(Infinity, offset, offset + count);
	}
}

/** Whether the chunk is still wanted: its screening runs, and nobody else has done it. */
async function wanted({ screening: id, position }: ChunkJob) {
	const [found] = await database()
		.select({ plan: screening.plan, state: screening.state, chunk: screeningChunk })
		.from(screeningChunk)
		.innerJoin(screening, eq(screening.id, screeningChunk.screeningId))
		.where(and(eq(screeningChunk.screeningId, id), eq(screeningChunk.position, position)));
	if (!found || found.chunk.doneAt !== null) return null;
	return found.state === 'queued' || found.state === 'running' ? found : null;
}

async function stillRuns(id: string): Promise<boolean> {
	const [found] = await database()
		.select({ state: screening.state })
		.from(screening)
		.where(eq(screening.id, id));
	return found.state === 'queued' || found.state === 'running';
}

/**
 * Computes one chunk and stores it; doing it twice changes nothing. A chunk of a cancelled or paused screening is given up.
 *
 * @param signal  of a worker that is to end: the chunk is given up and goes to another one
 */
export async function runChunk(job: ChunkJob, signal: AbortSignal): Promise<'done' | 'given up'> {
	const found = await wanted(job);
	if (!found) return 'given up';
	const { plan, chunk } = found;
	const from = await prepare(job.screening, plan);
	const began = performance.now();
	const count = plan.separationsNm.length;
	const cells = chunk.toCell - chunk.fromCell;
	const into = { pressures: new Float64Array(cells * count), bounds: new Float32Array(cells * count) };
	let sliceEnd = performance.now() + SLICE_MS;
	let lookAt = performance.now() + LOOK_MS;
	for (let cell = 0; cell < cells; cell += 1) {
		computeCell(from, chunk.fromCell + cell, into, cell * count);
		if (performance.now() < sliceEnd) continue;
		await nextTurn();
		if (signal.aborted) return 'given up';
		if (performance.now() > lookAt) {
			if (!(await stillRuns(job.screening))) return 'given up';
			lookAt = performance.now() + LOOK_MS;
		}
		sliceEnd = performance.now() + SLICE_MS;
	}
	await database().transaction((tx) => store(tx, job, cells, into, (performance.now() - began) / 1000));
	return 'done';
}

const bytesOf = ({ buffer, byteOffset, byteLength }: Float64Array | Float32Array) =>
	Buffer.from(buffer as ArrayBuffer, byteOffset, byteLength);

async function store(
	tx: Transaction,
	{ screening: id, position }: ChunkJob,
	cells: number,
	{ pressures, bounds }: Computed,
	seconds: number
): Promise<void> {
	// The screening's row first, as everybody who steers it takes it.
	const [row] = await tx.select().from(screening).where(eq(screening.id, id)).for('update');
	if (row.state !== 'queued' && row.state !== 'running') return;
	const stored = await tx
		.update(screeningChunk)
		.set({
			pressures: bytesOf(pressures),
			bounds: bytesOf(bounds),
			doneAt: now(),
			seconds,
			worker: `${hostname()} ${process.pid}`
		})
		.where(
			and(
				eq(screeningChunk.screeningId, id),
				eq(screeningChunk.position, position),
				isNull(screeningChunk.doneAt)
			)
		)
		.returning({ position: screeningChunk.position });
	if (stored.length === 0) return;
	const last = row.chunksDone + 1 === row.chunks;
	await tx
		.update(screening)
		.set({
			chunksDone: row.chunksDone + 1,
			cellsDone: row.cellsDone + cells,
			computedSeconds: row.computedSeconds + seconds,
			startedAt: row.startedAt ?? now(),
			runtime: `node ${process.version}`,
			state: last ? 'finished' : 'running',
			...(last ? { finishedAt: now(), checksum: await resultChecksum(tx, id, row.checksum ?? '') } : {})
		})
		.where(eq(screening.id, id));
	if (last && row.estimatedSeconds > LONG_SECONDS)
		await tell(tx, [row.ownerId], { kind: 'screening-finished', screening: row.name, screeningId: id });
}

/** SHA-256 over the checksum of the plan and every pressure in order: the same numbers, the same name. */
async function resultChecksum(tx: Transaction, id: string, planChecksum: string): Promise<string> {
	const hash = createHash('sha256').update(planChecksum);
	const chunks = await tx
		.select({ sum: sql<string>`encode(sha256(${screeningChunk.pressures}), 'hex')` })
		.from(screeningChunk)
		.where(eq(screeningChunk.screeningId, id))
		.orderBy(screeningChunk.position);
	for (const { sum } of chunks) hash.update(sum);
	return `sha256:${hash.digest('hex')}`;
}

/** What cannot be computed at all must not be tried for ever. */
export async function fail({ screening: id }: ChunkJob, why: string): Promise<void> {
	await database()
		.update(screening)
		.set({ state: 'failed', failure: why.slice(0, 500), finishedAt: now() })
		.where(and(eq(screening.id, id), sql`${screening.state} in ('queued', 'running')`));
}
