import { and, eq, inArray, or, type SQL } from 'drizzle-orm';
import type { SignedIn } from '../../schemas/person.ts';
import { screening } from '../db/schema/screening.ts';

/** Who sees a screening; only its owner steers it. */
export function seenBy(actor: SignedIn): SQL {
	const groups = actor.groups.map(({ id }) => id);
	const led = actor.groups.filter(({ lead }) => lead).map(({ id }) => id);
	return or(
		eq(screening.ownerId, actor.id),
		eq(screening.visibility, 'signed-in'),
		groups.length > 0
			? and(eq(screening.visibility, 'group'), inArray(screening.groupId, groups))
			: undefined,
		led.length > 0 ? inArray(screening.groupId, led) : undefined
	) as SQL;
}
