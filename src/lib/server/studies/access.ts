import { sql, type SQL } from 'drizzle-orm';
import type { SignedIn } from '../../schemas/person.ts';
import { study } from '../db/schema/study.ts';
import { sharedWith } from '../people/sharing.ts';

/** Who sees a study, and who changes it. What one may not see does not exist. */

export const seenBy = (actor: SignedIn): SQL => sharedWith(actor, study, ['signed-in']);

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
