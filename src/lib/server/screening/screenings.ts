import { and, desc, eq, ilike, inArray, isNull, ne, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import { ENGINE_VERSION } from '../../engine/index.ts';
import { cellsIn } from '../../screening/cells.ts';
import type { SignedIn } from '../../schemas/person.ts';
import type { NewScreening, ScreeningPlan, ScreeningSummary } from '../../schemas/screening.ts';
import { decodeCursor, page } from '../api/paginate.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database, type Executor, type Transaction } from '../db/client.ts';
import { group } from '../db/schema/group.ts';
import { person } from '../db/schema/people.ts';
import { screening, screeningChunk, type ScreeningState } from '../db/schema/screening.ts';
import { Forbidden, InvalidInput, NotFound, StateError } from '../errors.ts';
import { enqueueChunks } from '../jobs/queue.ts';
import { canonicalJson, sha256 } from '../library/canonical.ts';
import { seenBy } from './access.ts';
import { estimatedSeconds, planScreening } from './plan.ts';

/** Screenings: stated, queued, steered and read. Workers do the rest (chunks.ts). */

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;

/** Seconds of work in a chunk: short enough to cancel and to take over, long enough that the queue costs nothing. */
const CHUNK_SECONDS = 0.4;
const CHUNK_CELLS = { min: 20, max: 2000 };
/** Of one person, at once. */
const LIVE_MAX = 20;
const PAGE = 60;

export const LIVE_STATES: readonly ScreeningState[] = ['queued', 'running', 'paused'];

const fields = {
	row: screening,
	owner: person.name,
	groupSlug: group.slug,
	groupName: group.name
};

const select = (executor: Executor, where: SQL | undefined) =>
	executor
		.select(fields)
		.from(screening)
		.innerJoin(person, eq(person.id, screening.ownerId))
		.leftJoin(group, eq(group.id, screening.groupId))
		.where(where);

type Found = Awaited<ReturnType<typeof select>>[number];

function toSummary({ row, owner, groupSlug, groupName }: Found): ScreeningSummary {
	const at = now().getTime();
	const running = row.state === 'running' && row.startedAt !== null && row.chunksDone > 0;
	const pace = running ? (at - (row.startedAt?.getTime() ?? at)) / row.chunksDone : 0;
	return {
		id: row.id,
		name: row.name,
		owner,
		group: groupSlug && groupName ? { slug: groupSlug, name: groupName } : null,
		visibility: row.visibility,
		state: row.state,
		cells: row.cells,
		cellsDone: row.cellsDone,
		separations: row.plan.separationsNm.length,
		estimatedSeconds: row.estimatedSeconds,
		secondsLeft: running ? (pace * (row.chunks - row.chunksDone)) / 1000 : null,
		createdAt: row.createdAt.toISOString(),
		finishedAt: row.finishedAt?.toISOString() ?? null,
		checksum: row.checksum,
		failure: row.failure
	};
}

function groupOf(actor: SignedIn, slug: string | null, visibility: string): string | null {
	const found = actor.groups.find((one) => one.slug === slug);
	if ((slug !== null && !found) || (visibility === 'group' && !found))
		throw new InvalidInput('Say which group may see it.', [
			{ path: 'group', message: 'name a group that you are in' }
		]);
	return found?.id ?? null;
}

function chunksOf(plan: ScreeningPlan, seconds: number): { fromCell: number; toCell: number }[] {
	const total = cellsIn(plan);
	const each = Math.min(
		CHUNK_CELLS.max,
		Math.max(CHUNK_CELLS.min, Math.round(CHUNK_SECONDS / (seconds / total)))
	);
	return Array.from({ length: Math.ceil(total / each) }, (_, index) => ({
		fromCell: index * each,
		toCell: Math.min(total, (index + 1) * each)
	}));
}

/** Chunks of this person that wait, so that nobody's second screening goes before somebody's first. */
async function waitingOf(tx: Transaction, ownerId: string): Promise<number> {
	const [{ total }] = await tx
		.select({ total: sql<number>`coalesce(sum(${screening.chunks} - ${screening.chunksDone}), 0)::int` })
		.from(screening)
		.where(and(eq(screening.ownerId, ownerId), inArray(screening.state, ['queued', 'running'])));
	return total;
}

/** @param basisId the screening that this one repeats */
export async function create(
	actor: SignedIn,
	wanted: NewScreening,
	basisId: string | null = null
): Promise<ScreeningSummary> {
	const plan = await planScreening(wanted.statement);
	const seconds = estimatedSeconds(plan);
	const groupId = groupOf(actor, wanted.group, wanted.visibility);
	return database().transaction(async (tx) => {
		await tx.select({ id: person.id }).from(person).where(eq(person.id, actor.id)).for('update');
		const live = await tx
			.select({ id: screening.id })
			.from(screening)
			.where(and(eq(screening.ownerId, actor.id), inArray(screening.state, [...LIVE_STATES])))
			.limit(LIVE_MAX);
		if (live.length === LIVE_MAX)
			throw new StateError(`${LIVE_MAX} screenings of yours wait or run. Let one end, or cancel it.`);
		const ahead = await waitingOf(tx, actor.id);
		const chunks = chunksOf(plan, seconds);
		const [{ id }] = await tx
			.insert(screening)
			.values({
				ownerId: actor.id,
				...{ groupId, plan, basisId },
				visibility: wanted.visibility,
				name: wanted.name,
				statement: wanted.statement,
				cells: cellsIn(plan),
				chunks: chunks.length,
				estimatedSeconds: seconds,
				engine: ENGINE_VERSION,
				checksum: sha256(canonicalJson(plan)),
				createdAt: now()
			})
			.returning({ id: screening.id });
		const rows = chunks.map((chunk, position) => ({ screeningId: id, position, ...chunk }));
		for (let start = 0; start < rows.length; start += 1000)
			await tx.insert(screeningChunk).values(rows.slice(start, start + 1000));
		await enqueueChunks(
			tx,
			rows.map(({ position }) => ({ screening: id, position })),
			ahead
		);
		await audited(tx, actor, 'create', id, { cells: cellsIn(plan), name: wanted.name });
		return toSummary((await select(tx, eq(screening.id, id)))[0]);
	});
}

const audited = (tx: Transaction, actor: SignedIn, verb: string, objectId: string, details = {}) =>
	appendAudit(tx, {
		actor: actor.id,
		action: `screening.${verb}`,
		objectType: 'screening',
		objectId,
		details
	});

export interface FoundScreening {
	screening: ScreeningSummary;
	row: typeof screening.$inferSelect;
	own: boolean;
}

/** @throws NotFound where it is not there, or not to be seen by this person */
export async function get(actor: SignedIn, id: string): Promise<FoundScreening> {
	const [found] = UUID.test(id) ? await select(database(), and(eq(screening.id, id), seenBy(actor))) : [];
	if (!found) throw new NotFound('There is no such screening, or it is not shared with you.');
	return { screening: toSummary(found), row: found.row, own: found.row.ownerId === actor.id };
}

export const screeningQuery = z.object({
	search: z.string().trim().max(200).default(''),
	show: z.enum(['mine', 'others']).default('mine'),
	cursor: z.string().max(400).optional()
});

const cursorKey = z.tuple([z.iso.datetime(), z.uuid()]);

export async function list(
	actor: SignedIn,
	{ search, show, cursor }: z.infer<typeof screeningQuery>
): Promise<{ screenings: ScreeningSummary[]; next: string | null }> {
	const [at, after] = cursor === undefined ? [] : decodeCursor(cursor, cursorKey);
	const pattern = `%${search.replace(/[\\%_]/g, '\\$&')}%`;
	const rows = await select(
		database(),
		and(
			seenBy(actor),
			show === 'mine' ? eq(screening.ownerId, actor.id) : ne(screening.ownerId, actor.id),
			search ? ilike(screening.name, pattern) : undefined,
			at === undefined
				? undefined
				: sql`(${screening.createdAt} < ${at}::timestamptz or (${screening.createdAt} = ${at}::timestamptz and ${screening.id} > ${after}::uuid))`
		)
	)
		.orderBy(desc(screening.createdAt), screening.id)
		.limit(PAGE + 1);
	const { rows: some, next } = page(rows, PAGE, ({ row }) => [row.createdAt.toISOString(), row.id]);
	return { screenings: some.map(toSummary), next };
}

/** Under the row's lock, by the owner alone. */
async function steer(
	actor: SignedIn,
	id: string,
	verb: string,
	from: readonly ScreeningState[],
	step: (
		tx: Transaction,
		row: typeof screening.$inferSelect
	) => Promise<Partial<typeof screening.$inferInsert>>
): Promise<ScreeningSummary> {
	const { own } = await get(actor, id);
	if (!own) throw new Forbidden('A screening is steered by its owner.');
	return database().transaction(async (tx) => {
		const [row] = await tx.select().from(screening).where(eq(screening.id, id)).for('update');
		if (!from.includes(row.state)) throw new StateError(`The screening is ${row.state} already.`);
		await tx
			.update(screening)
			.set(await step(tx, row))
			.where(eq(screening.id, id));
		await audited(tx, actor, verb, id);
		return toSummary((await select(tx, eq(screening.id, id)))[0]);
	});
}

/** Workers look at the state several times a second; what waits in the queue ends unseen. */
export const cancel = (actor: SignedIn, id: string) =>
	steer(actor, id, 'cancel', LIVE_STATES, () => Promise.resolve({ state: 'cancelled', finishedAt: now() }));

export const pause = (actor: SignedIn, id: string) =>
	steer(actor, id, 'pause', ['queued', 'running'], () => Promise.resolve({ state: 'paused' }));

export const resume = (actor: SignedIn, id: string) =>
	steer(actor, id, 'resume', ['paused'], async (tx, row) => {
		const open = await tx
			.select({ position: screeningChunk.position })
			.from(screeningChunk)
			.where(and(eq(screeningChunk.screeningId, id), isNull(screeningChunk.doneAt)))
			.orderBy(screeningChunk.position);
		await enqueueChunks(
			tx,
			open.map(({ position }) => ({ screening: id, position })),
			await waitingOf(tx, row.ownerId)
		);
		return { state: row.startedAt ? 'running' : 'queued' };
	});

/** The same statement with the versions of today. */
export async function repeat(actor: SignedIn, id: string): Promise<ScreeningSummary> {
	const { row } = await get(actor, id);
	const again = {
		name: `${row.name} (again)`.slice(0, 200),
		statement: row.statement,
		visibility: 'private' as const,
		group: null
	};
	return create(actor, again, id);
}

/** By its owner, at any time; what was computed stays as it is. */
export async function share(
	actor: SignedIn,
	id: string,
	{ visibility, group: slug }: Pick<NewScreening, 'visibility' | 'group'>
): Promise<void> {
	const { own } = await get(actor, id);
	if (!own) throw new Forbidden('Who sees a screening is for its owner to say.');
	const groupId = groupOf(actor, slug, visibility);
	await database().transaction(async (tx) => {
		await tx.update(screening).set({ visibility, groupId }).where(eq(screening.id, id));
		await audited(tx, actor, 'share', id, { visibility });
	});
}

/** Of somebody's own, for the copy of their data. */
export async function ownScreenings(owner: SignedIn): Promise<ScreeningSummary[]> {
	const rows = await select(database(), eq(screening.ownerId, owner.id))
		.orderBy(screening.createdAt)
		.limit(10_000);
	return rows.map(toSummary);
}
