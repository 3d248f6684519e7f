import { and, desc, eq, ilike, inArray, ne, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { SignedIn } from '../../schemas/person.ts';
import {
	recordContent,
	type RecordFlag,
	type RecordQuery,
	type RecordSummary,
	type RecordVisibility,
	type SavedRecord
} from '../../schemas/record.ts';
import { decodeCursor, page } from '../api/paginate.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { version } from '../db/schema/dataset.ts';
import { group } from '../db/schema/group.ts';
import { person } from '../db/schema/people.ts';
import { record, recordAccess, recordPin } from '../db/schema/record.ts';
import { Forbidden, InvalidInput, NotFound } from '../errors.ts';
import * as versions from '../library/versions.ts';
import { nobody } from '../studies/access.ts';
import { seenBy } from './access.ts';

/** Reading records, and who may read them. */

const CHECKSUM = /^[0-9a-f]{64}$/;

export interface FoundRecord {
	record: SavedRecord;
	/** The very characters that the checksum names. */
	text: string;
	own: boolean;
}

/** @throws NotFound where it is not there, or not to be seen by this reader */
export async function get(reader: SignedIn | null, checksum: string): Promise<FoundRecord> {
	const [row] = CHECKSUM.test(checksum)
		? await database()
				.select({
					text: record.content,
					access: recordAccess,
					owner: person.name,
					groupSlug: group.slug,
					groupName: group.name
				})
				.from(record)
				.innerJoin(recordAccess, eq(recordAccess.checksum, record.checksum))
				.innerJoin(person, eq(person.id, recordAccess.ownerId))
				.leftJoin(group, eq(group.id, recordAccess.groupId))
				.where(and(eq(record.checksum, checksum), seenBy(reader)))
		: [];
	if (!row) throw new NotFound('There is no such record, or it is not shared with you.');
	const { text, access, owner, groupSlug, groupName } = row;
	const content = recordContent.parse(JSON.parse(text));
	return {
		text,
		own: reader?.id === access.ownerId,
		record: {
			checksum,
			visibility: access.visibility,
			group: groupSlug && groupName ? { slug: groupSlug, name: groupName } : null,
			owner,
			flags: await flagsOf(content.versions.map(({ ref }) => ref)),
			content
		}
	};
}

async function flagsOf(refs: readonly string[]): Promise<RecordFlag[]> {
	const resolved = await versions.resolve(refs);
	const flags: RecordFlag[] = [];
	for (const [ref, { state, supersededBy }] of resolved) {
		if (state === 'withdrawn') {
			const [slug, number] = ref.split('@');
			const { withdrawn } = await versions.get(slug, number);
			flags.push({ ref, kind: 'withdrawn', words: withdrawn?.reason ?? 'withdrawn' });
		} else if (supersededBy) {
			const next = supersededBy.includes('@') ? supersededBy : `${ref.split('@')[0]}@${supersededBy}`;
			flags.push({ ref, kind: 'superseded', words: next });
		}
	}
	return flags;
}

/** Of a study, newest first; only those that the reader may see. */
export async function ofStudy(reader: SignedIn, studyId: string): Promise<RecordSummary[]> {
	return (await select(and(eq(record.studyId, studyId), seenBy(reader)), undefined, 50)).map(toSummary);
}

const PAGE = 60;

export async function list(
	reader: SignedIn | null,
	{ search, show, cursor }: RecordQuery
): Promise<{ records: RecordSummary[]; next: string | null }> {
	const pattern = `%${search.replace(/[\\%_]/g, '\\$&')}%`;
	const rows = await select(
		and(seenBy(reader), shown(reader, show), search ? ilike(record.name, pattern) : undefined),
		cursor,
		PAGE + 1
	);
	const { rows: some, next } = page(rows, PAGE, ({ frozenAt, checksum }) => [
		frozenAt.toISOString(),
		checksum
	]);
	return { records: some.map(toSummary), next };
}

function shown(reader: SignedIn | null, show: RecordQuery['show']): SQL | undefined {
	if (!reader) return undefined;
	const groups = reader.groups.map(({ id }) => id);
	switch (show) {
		case 'mine':
			return eq(recordAccess.ownerId, reader.id);
		case 'group':
			return groups.length === 0 ? nobody : inArray(recordAccess.groupId, groups);
		case 'open':
			return and(
				inArray(recordAccess.visibility, ['signed-in', 'everybody']),
				ne(recordAccess.ownerId, reader.id)
			);
	}
}

const cursorKey = z.tuple([z.iso.datetime(), z.string().regex(CHECKSUM)]);

type Row = Awaited<ReturnType<typeof select>>[number];

function select(where: SQL | undefined, cursor: string | undefined, limit: number) {
	const [at, after] = cursor === undefined ? [] : decodeCursor(cursor, cursorKey);
	return database()
		.select({
			checksum: record.checksum,
			name: record.name,
			frozenAt: record.frozenAt,
			visibility: recordAccess.visibility,
			owner: person.name,
			group: group.name,
			withdrawn: sql<number>`(select count(*)::int from ${recordPin} join ${version} on ${version.id} = ${recordPin.versionId}
				where ${recordPin.checksum} = ${record.checksum} and ${version.state} = 'withdrawn')`
		})
		.from(record)
		.innerJoin(recordAccess, eq(recordAccess.checksum, record.checksum))
		.innerJoin(person, eq(person.id, recordAccess.ownerId))
		.leftJoin(group, eq(group.id, recordAccess.groupId))
		.where(
			and(
				where,
				at === undefined
					? undefined
					: sql`(${record.frozenAt} < ${at}::timestamptz or (${record.frozenAt} = ${at}::timestamptz and ${record.checksum} > ${after}))`
			)
		)
		.orderBy(desc(record.frozenAt), record.checksum)
		.limit(limit);
}

const toSummary = ({ frozenAt, ...row }: Row): RecordSummary => ({
	...row,
	frozenAt: frozenAt.toISOString()
});

/** By its owner. The record itself stays as it is. */
export async function share(actor: SignedIn, checksum: string, visibility: RecordVisibility): Promise<void> {
	const { own, record: found } = await get(actor, checksum);
	if (!own) throw new Forbidden('Who sees a record is for its owner to say.');
	if (visibility === 'group' && !found.group)
		throw new InvalidInput('The record belongs to no group.', [
			{ path: 'visibility', message: 'private, signed-in or everybody' }
		]);
	await database().transaction(async (tx) => {
		await tx
			.update(recordAccess)
			.set({ visibility, changedAt: now() })
			.where(eq(recordAccess.checksum, checksum));
		await appendAudit(tx, {
			actor: actor.id,
			action: 'record.share',
			objectType: 'record',
			objectId: checksum,
			details: { visibility }
		});
	});
}

/** Names of everything that somebody owns, for the copy of their data; the records themselves are at their addresses. */
export async function ownRecords(owner: SignedIn): Promise<RecordSummary[]> {
	return (await select(eq(recordAccess.ownerId, owner.id), undefined, 10_000)).map(toSummary);
}
