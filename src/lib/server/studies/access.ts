import { and, eq, inArray, or, sql, type SQL } from 'drizzle-orm';
import type { SignedIn } from '../../schemas/person.ts';
import { study } from '../db/schema/study.ts';

/** Who sees a study, and who changes it. What one may not see does not exist. */

/** The owner; its group where it is shared with it; everybody signed in where it is open to them; a lead of its group always. */
export function seenBy(actor: SignedIn): SQL {
	const groups = actor.groups.map(({ id }) => id);
	const led = actor.groups.filter(({ lead }) => lead).map(({ id }) => id);
	return or(
		eq(study.ownerId, actor.id),
		eq(study.visibility, 'signed-in'),
		groups.length > 0 ? and(eq(study.visibility, 'group'), inArray(study.groupId, groups)) : undefined,
		led.length > 0 ? inArray(study.groupId, led) : undefined
	) as SQL;
}

/** The owner, and who works in the group that it is shared with. */
export function mayEdit(
	actor: SignedIn,
	{ ownerId, groupId, visibility }: Pick<typeof study.$inferSelect, 'ownerId' | 'groupId' | 'visibility'>
): boolean {
	if (ownerId === actor.id) return true;
	return (
		actor.role !== 'reader' &&
		visibility === 'group' &&
		groupId !== null &&
		actor.groups.some(({ id }) => id === groupId)
	);
}

export const nobody: SQL = sql`false`;
