import { and, eq, inArray, or, type SQL } from 'drizzle-orm';
import type { AnyPgColumn } from 'drizzle-orm/pg-core';
import type { SignedIn } from '../../schemas/person.ts';

/** Who sees what somebody made and may share: studies, records and screenings go by the same rule. */

interface Shared {
	ownerId: AnyPgColumn;
	groupId: AnyPgColumn;
	visibility: AnyPgColumn;
}

/**
 * The owner; its group where it is shared with it; everybody signed in where it is open to them; a lead of its group always.
 *
 * @param open  the words of its visibility that open it to everybody signed in
 */
export function sharedWith(
	actor: SignedIn,
	{ ownerId, groupId, visibility }: Shared,
	open: readonly string[]
): SQL {
	const groups = actor.groups.map(({ id }) => id);
	const led = actor.groups.filter(({ lead }) => lead).map(({ id }) => id);
	return or(
		eq(ownerId, actor.id),
		inArray(visibility, [...open]),
		groups.length > 0 ? and(eq(visibility, 'group'), inArray(groupId, groups)) : undefined,
		led.length > 0 ? inArray(groupId, led) : undefined
	) as SQL;
}
