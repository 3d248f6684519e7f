import { and, eq, inArray, ne } from 'drizzle-orm';
import type { SignedIn } from '../../schemas/person.ts';
import { database } from '../db/client.ts';
import { membership } from '../db/schema/group.ts';
import { person } from '../db/schema/people.ts';
import { Forbidden, InvalidInput } from '../errors.ts';
import { tell } from '../library/tell.ts';
import * as studies from './studies.ts';

/** Giving a study to somebody else in a group of one's own. */

/** People who share a group with the caller, and could keep a study. */
export async function heirs(actor: SignedIn): Promise<{ id: string; name: string }[]> {
	const groups = actor.groups.map(({ id }) => id);
	if (groups.length === 0) return [];
	return database()
		.selectDistinct({ id: person.id, name: person.name })
		.from(membership)
		.innerJoin(person, eq(person.id, membership.personId))
		.where(and(inArray(membership.groupId, groups), eq(person.state, 'active'), ne(person.id, actor.id)))
		.orderBy(person.name)
		.limit(500);
}

/** The new owner is told. A group that they are not in no longer has the study. */
export async function transfer(
	actor: SignedIn,
	studyId: string,
	{ to, revision }: { to: string; revision: number }
): Promise<void> {
	const { own, study: kept } = await studies.get(actor, studyId);
	if (!own) throw new Forbidden('A study is given away by its owner.');
	const heir = (await heirs(actor)).find(({ id }) => id === to);
	if (!heir)
		throw new InvalidInput('Nobody has this study now but you.', [
			{ path: 'to', message: 'choose somebody of a group of yours' }
		]);
	await database().transaction(async (tx) => {
		const memberships = await tx
			.select({ groupId: membership.groupId })
			.from(membership)
			.where(eq(membership.personId, heir.id));
		await studies.changeIn(tx, actor, studyId, revision, 'transfer', (row) => {
			const stays = memberships.some(({ groupId }) => groupId === row.groupId);
			return {
				ownerId: heir.id,
				groupId: stays ? row.groupId : null,
				visibility: row.visibility === 'group' && !stays ? 'private' : row.visibility
			};
		});
		await tell(tx, [heir.id], { kind: 'study-given', by: actor.name, study: kept.name, studyId });
	});
}
