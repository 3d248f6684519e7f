import { and, asc, desc, eq, ilike, isNotNull, isNull, ne, or, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { SignedIn } from '../../schemas/person.ts';
import type { NewStudy, SavedStudy, StudyChange, StudyQuery } from '../../schemas/saved-study.ts';
import { decodeCursor, page } from '../api/paginate.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database, type Executor, type Transaction } from '../db/client.ts';
import { group } from '../db/schema/group.ts';
import { person } from '../db/schema/people.ts';
import { study, studyChange } from '../db/schema/study.ts';
import { Conflict, Forbidden, InvalidInput, NotFound } from '../errors.ts';
import { mayEdit, nobody, seenBy } from './access.ts';
import { pin, refsIn } from './pins.ts';

/** Studies that are kept: made, seen, changed, with every state that they went through. */

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;

const nameOfPerson = (column: typeof study.ownerId | typeof study.savedBy) =>
	sql<string>`(select ${person.name} from ${person} where ${person.id} = ${column})`;

const SUMMARY = {
	row: study,
	owner: nameOfPerson(study.ownerId),
	savedBy: nameOfPerson(study.savedBy),
	groupSlug: group.slug,
	groupName: group.name
};

type Found = Awaited<ReturnType<typeof select>>[number];

const select = (executor: Executor, where: SQL | undefined) =>
	executor.select(SUMMARY).from(study).leftJoin(group, eq(study.groupId, group.id)).where(where);

function toSaved({ row, owner, savedBy, groupSlug, groupName }: Found): SavedStudy {
	const { id, name, query, notes, reasons, visibility, revision, savedAt, archivedAt } = row;
	return {
		id,
		name,
		query,
		notes,
		reasons,
		owner,
		group: groupSlug && groupName ? { slug: groupSlug, name: groupName } : null,
		visibility,
		revision,
		savedAt: savedAt.toISOString(),
		savedBy,
		archived: archivedAt !== null,
		versions: refsIn(query)
	};
}

async function find(executor: Executor, actor: SignedIn, id: string): Promise<Found> {
	const [found] = UUID.test(id) ? await select(executor, and(eq(study.id, id), seenBy(actor))) : [];
	if (!found) throw new NotFound('There is no such study, or it is not shared with you.');
	return found;
}

/** @throws NotFound where it is not there, or not to be seen by this person */
export async function get(
	actor: SignedIn,
	id: string
): Promise<{ study: SavedStudy; mayEdit: boolean; own: boolean }> {
	const found = await find(database(), actor, id);
	return { study: toSaved(found), mayEdit: mayEdit(actor, found.row), own: found.row.ownerId === actor.id };
}

/** Without asking who reads: for those whom a link let in. */
export async function read(id: string): Promise<SavedStudy> {
	const [found] = UUID.test(id) ? await select(database(), eq(study.id, id)) : [];
	if (!found) throw new NotFound('There is no such study.');
	return toSaved(found);
}

/** @throws InvalidInput for a group that is not one's own */
function groupOf(actor: SignedIn, slug: string | null, visibility: string): string | null {
	const found = actor.groups.find((one) => one.slug === slug);
	if (slug !== null && !found)
		throw new InvalidInput('The group is not one of yours.', [
			{ path: 'group', message: 'name a group that you are in, or none' }
		]);
	if (visibility === 'group' && !found)
		throw new InvalidInput('Say which group may see it.', [
			{ path: 'group', message: 'name a group that you are in' }
		]);
	return found?.id ?? null;
}

export async function create(actor: SignedIn, fields: NewStudy): Promise<SavedStudy> {
	return database().transaction(async (tx) => {
		const at = now();
		const [row] = await tx
			.insert(study)
			.values({
				ownerId: actor.id,
				groupId: groupOf(actor, fields.group, fields.visibility),
				visibility: fields.visibility,
				name: fields.name,
				query: fields.query,
				notes: fields.notes,
				reasons: fields.reasons,
				createdAt: at,
				savedAt: at,
				savedBy: actor.id
			})
			.returning();
		await pin(tx, row.id, row.query);
		await remember(tx, actor, row);
		await audited(tx, actor, 'create', row.id, { name: row.name });
		return toSaved(await find(tx, actor, row.id));
	});
}

const remember = (tx: Transaction, actor: SignedIn, row: typeof study.$inferSelect) =>
	tx.insert(studyChange).values({
		studyId: row.id,
		revision: row.revision,
		name: row.name,
		query: row.query,
		notes: row.notes,
		reasons: row.reasons,
		by: actor.id,
		at: row.savedAt
	});

const audited = (
	tx: Transaction,
	actor: SignedIn,
	verb: string,
	objectId: string,
	details: Record<string, unknown>
) => appendAudit(tx, { actor: actor.id, action: `study.${verb}`, objectType: 'study', objectId, details });

/**
 * Saves what was changed since the state that the caller saw.
 *
 * @throws Conflict naming who saved in between; Forbidden for what only the owner decides
 */
export async function change(actor: SignedIn, id: string, wanted: StudyChange): Promise<SavedStudy> {
	return database().transaction(async (tx) => {
		const locked = await lockedState(tx, actor, id, wanted.revision);
		const decides =
			wanted.visibility !== undefined || wanted.group !== undefined || wanted.archived !== undefined;
		if (decides && locked.ownerId !== actor.id)
			throw new Forbidden('Who sees a study, and whether it is archived, is for its owner to say.');

		const visibility = wanted.visibility ?? locked.visibility;
		const groupId =
			wanted.group === undefined && wanted.visibility === undefined
				? locked.groupId
				: groupOf(actor, wanted.group ?? groupSlug(actor, locked.groupId), visibility);
		const archivedAt =
			wanted.archived === undefined
				? locked.archivedAt
				: wanted.archived
					? (locked.archivedAt ?? now())
					: null;
		const row = await store(tx, actor, locked, 'change', {
			name: wanted.name ?? locked.name,
			query: wanted.query ?? locked.query,
			notes: wanted.notes ?? locked.notes,
			reasons: wanted.reasons ?? locked.reasons,
			...{ visibility, groupId, archivedAt }
		});
		return toSaved(await find(tx, actor, row.id));
	});
}

type Row = typeof study.$inferSelect;

/** @throws Conflict naming who saved since `revision` */
async function lockedState(tx: Transaction, actor: SignedIn, id: string, revision: number): Promise<Row> {
	const [locked] = UUID.test(id)
		? await tx
				.select()
				.from(study)
				.where(and(eq(study.id, id), seenBy(actor)))
				.for('update')
		: [];
	if (!locked) throw new NotFound('There is no such study, or it is not shared with you.');
	if (!mayEdit(actor, locked))
		throw new Forbidden('You may read this study. Duplicate it to have one of your own.');
	if (locked.revision !== revision) {
		const { savedBy } = await find(tx, actor, id);
		throw new Conflict(
			`${savedBy} saved this study at ${locked.savedAt.toISOString().slice(11, 19)} UTC. Load it again, or keep yours as a copy.`
		);
	}
	return locked;
}

/** The next state, remembered and audited. */
async function store(
	tx: Transaction,
	actor: SignedIn,
	locked: Row,
	verb: string,
	change: Partial<Row>
): Promise<Row> {
	const [row] = await tx
		.update(study)
		.set({ ...change, revision: locked.revision + 1, savedAt: now(), savedBy: actor.id })
		.where(eq(study.id, locked.id))
		.returning();
	if (row.query !== locked.query) await pin(tx, row.id, row.query);
	await remember(tx, actor, row);
	await audited(tx, actor, verb, row.id, changedNames(locked, row));
	return row;
}

/** A step of another service, under the same lock and with the same history. */
export async function changeIn(
	tx: Transaction,
	actor: SignedIn,
	id: string,
	revision: number,
	verb: string,
	step: (row: Row) => Partial<Row>
): Promise<void> {
	const locked = await lockedState(tx, actor, id, revision);
	await store(tx, actor, locked, verb, step(locked));
}

const groupSlug = (actor: SignedIn, id: string | null) =>
	actor.groups.find((one) => one.id === id)?.slug ?? null;

function changedNames(before: Row, after: Row) {
	const names = [
		...(['name', 'query', 'notes', 'reasons', 'visibility', 'groupId', 'archivedAt', 'ownerId'] as const)
	];
	const changed = names.filter((name) => JSON.stringify(before[name]) !== JSON.stringify(after[name]));
	return { revision: after.revision, changed };
}

/** Somebody's own copy of what they may see; private until they say otherwise. */
export async function duplicate(actor: SignedIn, id: string): Promise<SavedStudy> {
	const { study: original } = await get(actor, id);
	return create(actor, {
		name: `${original.name} (copy)`.slice(0, 200),
		query: original.query,
		notes: original.notes,
		reasons: original.reasons,
		visibility: 'private',
		group: null
	});
}

export interface StudyState {
	revision: number;
	name: string;
	query: string;
	notes: string;
	reasons: string[];
	by: string;
	at: string;
}

/** Newest first. */
export async function history(actor: SignedIn, id: string, limit = 200): Promise<StudyState[]> {
	await find(database(), actor, id);
	const rows = await database()
		.select({ row: studyChange, by: person.name })
		.from(studyChange)
		.innerJoin(person, eq(studyChange.by, person.id))
		.where(eq(studyChange.studyId, id))
		.orderBy(desc(studyChange.revision))
		.limit(limit);
	return rows.map(({ row: { revision, name, query, notes, reasons, at }, by }) => ({
		revision,
		name,
		query,
		notes,
		reasons,
		by,
		at: at.toISOString()
	}));
}

/** Any earlier state as a new one: nothing in between is lost. */
export async function restore(
	actor: SignedIn,
	id: string,
	{ from, revision }: { from: number; revision: number }
): Promise<SavedStudy> {
	await find(database(), actor, id);
	const [state] = await database()
		.select()
		.from(studyChange)
		.where(and(eq(studyChange.studyId, id), eq(studyChange.revision, from)));
	if (!state) throw new NotFound(`This study never had a state ${from}.`);
	const { name, query, notes, reasons } = state;
	return change(actor, id, { revision, name, query, notes, reasons });
}

const PAGE = 60;

/** A page of studies that somebody may see, newest or by name. */
export async function list(
	actor: SignedIn,
	{ search, show, sort, cursor }: StudyQuery
): Promise<{ studies: SavedStudy[]; next: string | null }> {
	const pattern = `%${search.replace(/[\\%_]/g, '\\$&')}%`;
	const key = sort === 'saved' ? study.savedAt : study.name;
	const rows = await select(
		database(),
		and(
			seenBy(actor),
			shown(actor, show),
			search ? or(ilike(study.name, pattern), ilike(study.notes, pattern)) : undefined,
			after(sort, cursor)
		)
	)
		.orderBy(sort === 'saved' ? desc(key) : asc(key), asc(study.id))
		.limit(PAGE + 1);
	const { rows: some, next } = page(rows, PAGE, ({ row }) =>
		sort === 'saved' ? [row.savedAt.toISOString(), row.id] : [row.name, row.id]
	);
	return { studies: some.map(toSaved), next };
}

function shown(actor: SignedIn, show: StudyQuery['show']): SQL | undefined {
	const own = eq(study.ownerId, actor.id);
	const groups = actor.groups.map(({ id }) => id);
	switch (show) {
		case 'mine':
			return and(own, isNull(study.archivedAt));
		case 'archived':
			return and(own, isNotNull(study.archivedAt));
		case 'group':
			return groups.length === 0
				? nobody
				: and(sql`${study.groupId} = any(${sql.param(groups)}::uuid[])`, isNull(study.archivedAt));
		case 'shared':
			return and(ne(study.ownerId, actor.id), eq(study.visibility, 'signed-in'), isNull(study.archivedAt));
	}
}

const cursorKey = z.tuple([z.string(), z.uuid()]);

function after(sort: StudyQuery['sort'], cursor: string | undefined): SQL | undefined {
	if (cursor === undefined) return undefined;
	const [key, id] = decodeCursor(cursor, cursorKey);
	return sort === 'saved'
		? sql`(${study.savedAt} < ${key}::timestamptz or (${study.savedAt} = ${key}::timestamptz and ${study.id} > ${id}::uuid))`
		: sql`(${study.name}, ${study.id}) > (${key}::text, ${id}::uuid)`;
}

/** Everything of somebody's own, the archive included, for the copy of their data. */
export async function ownStudies(actor: SignedIn): Promise<SavedStudy[]> {
	const rows = await select(database(), eq(study.ownerId, actor.id)).orderBy(asc(study.createdAt));
	return rows.map(toSaved);
}
