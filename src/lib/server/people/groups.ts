import { and, asc, count, eq, isNull, sql } from 'drizzle-orm';
import { z } from 'zod';
import type { NewGroup } from '../../schemas/group.ts';
import type { Role, SignedIn } from '../../schemas/person.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database, type Transaction } from '../db/client.ts';
import { group, membership } from '../db/schema/group.ts';
import { person } from '../db/schema/people.ts';
import { Conflict, NotFound, StateError } from '../errors.ts';
import { failingOf } from './constraint.ts';
import { noSuchGroup, requireAdministrator, requireManagesGroup, requireSeesGroup } from './rights.ts';

export interface GroupSummary {
	id: string;
	slug: string;
	name: string;
	members: number;
	closed: boolean;
}

export interface Member {
	id: string;
	name: string;
	/** For those who manage the group; others know each other by name. */
	email: string | null;
	role: Role;
	lead: boolean;
}

export interface GroupDetail extends GroupSummary {
	people: Member[];
	/** Whether the asking person may change who is in it. */
	managed: boolean;
}

export async function list(actor: SignedIn): Promise<GroupSummary[]> {
	requireAdministrator(actor);
	const rows = await database()
		.select({
			id: group.id,
			slug: group.slug,
			name: group.name,
			closedAt: group.closedAt,
			members: count(membership.personId)
		})
		.from(group)
		.leftJoin(membership, eq(membership.groupId, group.id))
		.groupBy(group.id)
		.orderBy(asc(sql`${group.closedAt} is not null`), asc(group.name))
		.limit(500);
	return rows.map(({ closedAt, ...row }) => ({ ...row, closed: closedAt !== null }));
}

/** Groups that a new member can be put into. */
export async function open(): Promise<{ id: string; name: string }[]> {
	return database()
		.select({ id: group.id, name: group.name })
		.from(group)
		.where(isNull(group.closedAt))
		.orderBy(asc(group.name))
		.limit(500);
}

/** @throws NotFound also for a group that the asking person is not in */
export async function get(actor: SignedIn, slug: string): Promise<GroupDetail> {
	const [found] = await database().select().from(group).where(eq(group.slug, slug));
	if (!found) throw noSuchGroup();
	requireSeesGroup(actor, found.id);
	const managed =
		actor.role === 'administrator' || actor.groups.some(({ id, lead }) => id === found.id && lead);
	const people = await database()
		.select({
			id: person.id,
			name: person.name,
			email: person.email,
			role: person.role,
			lead: membership.lead
		})
		.from(membership)
		.innerJoin(person, eq(person.id, membership.personId))
		.where(and(eq(membership.groupId, found.id), eq(person.state, 'active')))
		.orderBy(asc(person.name), asc(person.id))
		.limit(500);
	return {
		id: found.id,
		slug: found.slug,
		name: found.name,
		closed: found.closedAt !== null,
		members: people.length,
		managed,
		people: people.map((member) => ({ ...member, email: managed ? member.email : null }))
	};
}

export async function create(actor: SignedIn, wanted: NewGroup): Promise<string> {
	requireAdministrator(actor);
	try {
		return await database().transaction((tx) => createIn(tx, actor.id, wanted));
	} catch (error) {
		if (failingOf(error) !== 'group_slug_key') throw error;
		throw new Conflict(`There is a group with the address ${wanted.slug} already. Choose another.`);
	}
}

export async function createIn(tx: Transaction, actor: string, wanted: NewGroup): Promise<string> {
	const [{ id }] = await tx.insert(group).values(wanted).returning({ id: group.id });
	await appendAudit(tx, {
		actor,
		action: 'group.create',
		objectType: 'group',
		objectId: id,
		details: { slug: wanted.slug }
	});
	return id;
}

async function changeGroup(
	actor: SignedIn,
	id: string,
	action: string,
	change: Partial<typeof group.$inferInsert>
): Promise<void> {
	await database().transaction(async (tx) => {
		const changed = await tx.update(group).set(change).where(eq(group.id, id)).returning({ id: group.id });
		if (changed.length === 0) throw noSuchGroup();
		await appendAudit(tx, { actor: actor.id, action, objectType: 'group', objectId: id });
	});
}

export async function rename(actor: SignedIn, id: string, name: string): Promise<void> {
	requireManagesGroup(actor, asId(id));
	await changeGroup(actor, id, 'group.rename', { name });
}

export async function close(actor: SignedIn, id: string): Promise<void> {
	requireAdministrator(actor);
	await changeGroup(actor, asId(id), 'group.close', { closedAt: now() });
}

export async function reopen(actor: SignedIn, id: string): Promise<void> {
	requireAdministrator(actor);
	await changeGroup(actor, asId(id), 'group.reopen', { closedAt: null });
}

function asId(text: string): string {
	if (!z.uuid().safeParse(text).success) throw noSuchGroup();
	return text;
}

const membershipId = (groupId: string, personId: string) => `${groupId}/${personId}`;

/** Puts a person into a group or changes whether they lead it, inside the caller's transaction. */
export async function enter(
	tx: Transaction,
	{ groupId, personId, lead, actor }: { groupId: string; personId: string; lead: boolean; actor: string }
): Promise<void> {
	const [current] = await tx
		.select({ closedAt: group.closedAt })
		.from(group)
		.where(eq(group.id, groupId))
		.for('share');
	if (!current) throw noSuchGroup();
	if (current.closedAt) throw new StateError('That group is closed. Reopen it first.');
	await tx
		.insert(membership)
		.values({ groupId, personId, lead, joinedAt: now() })
		.onConflictDoUpdate({ target: [membership.groupId, membership.personId], set: { lead } });
	await appendAudit(tx, {
		actor,
		action: 'membership.set',
		objectType: 'membership',
		objectId: membershipId(groupId, personId),
		details: { lead }
	});
}

/** An administrator adds somebody who has an account; leads invite by mail. */
export async function add(
	actor: SignedIn,
	{ groupId, personId, lead }: { groupId: string; personId: string; lead: boolean }
): Promise<void> {
	requireAdministrator(actor);
	if (!z.uuid().safeParse(personId).success) throw noSuchMember();
	await database().transaction(async (tx) => {
		const [known] = await tx
			.select({ id: person.id })
			.from(person)
			.where(and(eq(person.id, personId), eq(person.state, 'active')));
		if (!known) throw noSuchMember();
		await enter(tx, { groupId: asId(groupId), personId, lead, actor: actor.id });
	});
}

export async function setLead(
	actor: SignedIn,
	{ groupId, personId, lead }: { groupId: string; personId: string; lead: boolean }
): Promise<void> {
	requireManagesGroup(actor, asId(groupId));
	await database().transaction(async (tx) => {
		await requireMember(tx, groupId, personId);
		await enter(tx, { groupId, personId, lead, actor: actor.id });
	});
}

async function requireMember(tx: Transaction, groupId: string, personId: string): Promise<void> {
	if (!z.uuid().safeParse(personId).success) throw noSuchMember();
	const [found] = await tx
		.select({ lead: membership.lead })
		.from(membership)
		.where(and(eq(membership.groupId, groupId), eq(membership.personId, personId)))
		.for('update');
	if (!found) throw noSuchMember();
}

function noSuchMember(): NotFound {
	return new NotFound('That person is not in the group.');
}

/** Counts at the member's next request: what they see of the group is decided anew each time. */
export async function remove(actor: SignedIn, groupId: string, personId: string): Promise<void> {
	requireManagesGroup(actor, asId(groupId));
	await database().transaction((tx) => exit(tx, { groupId, personId, actor: actor.id }));
}

/** @throws NotFound where one is not in it, whether or not there is such a group */
export async function leave(actor: SignedIn, groupId: string): Promise<void> {
	const exited = { groupId: asId(groupId), personId: actor.id, actor: actor.id };
	await database().transaction((tx) => exit(tx, exited));
}

async function exit(
	tx: Transaction,
	{ groupId, personId, actor }: { groupId: string; personId: string; actor: string }
): Promise<void> {
	await requireMember(tx, groupId, personId);
	await tx.delete(membership).where(and(eq(membership.groupId, groupId), eq(membership.personId, personId)));
	await appendAudit(tx, {
		actor,
		action: 'membership.end',
		objectType: 'membership',
		objectId: membershipId(groupId, personId)
	});
}

/** Out of every group, as part of deleting an account. */
export async function exitAll(tx: Transaction, personId: string): Promise<void> {
	const memberships = await tx
		.select({ groupId: membership.groupId })
		.from(membership)
		.where(eq(membership.personId, personId));
	for (const { groupId } of memberships) await exit(tx, { groupId, personId, actor: personId });
}
