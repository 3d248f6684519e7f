import { and, asc, eq } from 'drizzle-orm';
import { preferences, type SignedIn } from '../../schemas/person.ts';
import type { Executor } from '../db/client.ts';
import { group, membership } from '../db/schema/group.ts';
import { person } from '../db/schema/people.ts';

/** Read anew at every request: a role or a membership that was taken away counts at once. Null unless active. */
export async function signedIn(executor: Executor, personId: string): Promise<SignedIn | null> {
	const rows = await executor
		.select({
			id: person.id,
			name: person.name,
			email: person.email,
			role: person.role,
			preferences: person.preferences,
			groupId: group.id,
			groupSlug: group.slug,
			groupName: group.name,
			lead: membership.lead
		})
		.from(person)
		.leftJoin(membership, eq(membership.personId, person.id))
		.leftJoin(group, eq(group.id, membership.groupId))
		.where(and(eq(person.id, personId), eq(person.state, 'active')))
		.orderBy(asc(group.name));
	if (rows.length === 0) return null;
	const [first] = rows;
	return {
		id: first.id,
		name: first.name,
		email: first.email ?? '',
		role: first.role,
		preferences: preferences.parse(first.preferences),
		groups: rows.flatMap(({ groupId, groupSlug, groupName, lead }) =>
			groupId && groupSlug && groupName
				? [{ id: groupId, slug: groupSlug, name: groupName, lead: lead === true }]
				: []
		)
	};
}
