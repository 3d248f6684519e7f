import { and, eq, inArray, or, type SQL } from 'drizzle-orm';
import type { SignedIn } from '../../schemas/person.ts';
import type { Principal } from '../auth/principal.ts';
import { recordAccess } from '../db/schema/record.ts';

/** Who sees a record. What one may not see does not exist. */

/** Null where nobody signed in: then only what is open to everybody is there. */
export function readerOf(principal: Principal): SignedIn | null {
	return principal.kind === 'session' || principal.kind === 'token' ? principal.person : null;
}

export function seenBy(reader: SignedIn | null): SQL {
	if (!reader) return eq(recordAccess.visibility, 'everybody');
	const groups = reader.groups.map(({ id }) => id);
	const led = reader.groups.filter(({ lead }) => lead).map(({ id }) => id);
	return or(
		eq(recordAccess.ownerId, reader.id),
		inArray(recordAccess.visibility, ['signed-in', 'everybody']),
		groups.length > 0
			? and(eq(recordAccess.visibility, 'group'), inArray(recordAccess.groupId, groups))
			: undefined,
		led.length > 0 ? inArray(recordAccess.groupId, led) : undefined
	) as SQL;
}
