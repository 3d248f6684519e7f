import { and, asc, eq, inArray, isNull, ne, sql } from 'drizzle-orm';
import type { NewComment, StudyComment } from '../../schemas/comment.ts';
import type { SignedIn } from '../../schemas/person.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database, type Transaction } from '../db/client.ts';
import { membership } from '../db/schema/group.ts';
import { person } from '../db/schema/people.ts';
import { study, studyComment } from '../db/schema/study.ts';
import { Forbidden, NotFound, StateError } from '../errors.ts';
import { tell } from '../library/tell.ts';
import * as studies from './studies.ts';

/** Comments: whoever sees a study may comment on it; whoever is named in one, and its owner, is told. */

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;
const COMMENTS_MAX = 500;

/** Oldest first. */
export async function list(actor: SignedIn, studyId: string): Promise<StudyComment[]> {
	await studies.get(actor, studyId);
	const rows = await database()
		.select({
			row: studyComment,
			by: person.name,
			resolvedBy: sql<
				string | null
			>`(select name from person as other where other.id = ${studyComment.resolvedBy})`
		})
		.from(studyComment)
		.innerJoin(person, eq(studyComment.personId, person.id))
		.where(eq(studyComment.studyId, studyId))
		.orderBy(asc(studyComment.createdAt), asc(studyComment.id))
		.limit(COMMENTS_MAX);
	return rows.map(({ row, by, resolvedBy }) => ({
		id: row.id,
		by,
		text: row.text,
		choice: row.choice,
		separationNm: row.separationNm,
		at: row.createdAt.toISOString(),
		resolved: row.resolvedAt && resolvedBy ? { at: row.resolvedAt.toISOString(), by: resolvedBy } : null
	}));
}

export async function add(actor: SignedIn, studyId: string, fields: NewComment): Promise<void> {
	const { study: kept } = await studies.get(actor, studyId);
	await database().transaction(async (tx) => {
		const [{ id }] = await tx
			.insert(studyComment)
			.values({ studyId, personId: actor.id, ...fields, createdAt: now() })
			.returning({ id: studyComment.id });
		await appendAudit(tx, {
			actor: actor.id,
			action: 'comment.add',
			objectType: 'comment',
			objectId: id,
			details: { study: studyId }
		});
		const named = await namedIn(tx, fields.text, studyId);
		const letter = { by: actor.name, study: kept.name, studyId, text: fields.text };
		await tell(tx, but(named, actor.id), { kind: 'study-mention', ...letter });
		const [{ ownerId }] = await tx
			.select({ ownerId: study.ownerId })
			.from(study)
			.where(eq(study.id, studyId));
		if (!named.includes(ownerId))
			await tell(tx, but([ownerId], actor.id), { kind: 'study-comment', ...letter });
	});
}

const but = (ids: readonly string[], id: string) => ids.filter((one) => one !== id);

/** Those whose name stands in the text after an @, of those who may see the study: a name tells nobody else of it. */
async function namedIn(tx: Transaction, text: string, studyId: string): Promise<string[]> {
	if (!text.includes('@')) return [];
	const [{ ownerId, groupId, visibility }] = await tx.select().from(study).where(eq(study.id, studyId));
	const members = groupId
		? await tx
				.select({ id: membership.personId, lead: membership.lead })
				.from(membership)
				.where(eq(membership.groupId, groupId))
		: [];
	const seeing = [
		ownerId,
		...members.filter(({ lead }) => lead || visibility === 'group').map(({ id }) => id)
	];
	const people = await tx
		.select({ id: person.id, name: person.name })
		.from(person)
		.where(
			and(
				eq(person.state, 'active'),
				visibility === 'signed-in' ? ne(person.name, '') : inArray(person.id, seeing),
				sql`position('@' || ${person.name} in ${text}) > 0`
			)
		);
	// "@Larkmoor reader 2" names the second reader and not the first one, whose name begins alike.
	return people
		.filter(({ name }) =>
			text
				.split(`@${name}`)
				.slice(1)
				.some(
					(rest) =>
						!people.some(
							(other) =>
								other.name !== name &&
								other.name.startsWith(name) &&
								`@${name}${rest}`.startsWith(`@${other.name}`)
						)
				)
		)
		.map(({ id }) => id);
}

/** By whoever wrote it, or by who works on the study. */
export async function resolve(actor: SignedIn, studyId: string, id: string): Promise<void> {
	const { mayEdit } = await studies.get(actor, studyId);
	await database().transaction(async (tx) => {
		const [found] = UUID.test(id)
			? await tx
					.select()
					.from(studyComment)
					.where(and(eq(studyComment.id, id), eq(studyComment.studyId, studyId)))
					.for('update')
			: [];
		if (!found) throw new NotFound('There is no such comment.');
		if (!mayEdit && found.personId !== actor.id)
			throw new Forbidden('A comment is settled by whoever wrote it or works on the study.');
		if (found.resolvedAt) throw new StateError('The comment is settled already.');
		await tx
			.update(studyComment)
			.set({ resolvedAt: now(), resolvedBy: actor.id })
			.where(and(eq(studyComment.id, id), isNull(studyComment.resolvedAt)));
		await appendAudit(tx, {
			actor: actor.id,
			action: 'comment.resolve',
			objectType: 'comment',
			objectId: id,
			details: { study: studyId }
		});
	});
}

/** Of a study that the caller may see. */
export async function countOpen(studyId: string): Promise<number> {
	const [{ total }] = await database()
		.select({ total: sql<number>`count(*)::int` })
		.from(studyComment)
		.where(and(eq(studyComment.studyId, studyId), isNull(studyComment.resolvedAt)));
	return total;
}
