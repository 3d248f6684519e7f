import { and, asc, eq, gt, ilike, or } from 'drizzle-orm';
import { z } from 'zod';
import type { PersonState, ProfileChange, Role, SignedIn } from '../../schemas/person.ts';
import { decodeCursor, page } from '../api/paginate.ts';
import { appendAudit } from '../audit/append.ts';
import { endAll } from '../auth/sessions.ts';
import { database, type Transaction } from '../db/client.ts';
import { person } from '../db/schema/people.ts';
import { NotFound, StateError } from '../errors.ts';
import { enqueue } from '../outbox/enqueue.ts';
import { failingOf } from './constraint.ts';
import { requireAdministrator } from './rights.ts';
import { revokeAll } from './tokens.ts';

export interface PersonSummary {
	id: string;
	name: string;
	email: string | null;
	role: Role;
	roleFrom: 'installation' | 'institution';
	state: PersonState;
	createdAt: string;
}

const PAGE = 50;

const summary = (row: typeof person.$inferSelect): PersonSummary => ({
	id: row.id,
	name: row.name,
	email: row.email,
	role: row.role,
	roleFrom: row.roleFrom,
	state: row.state,
	createdAt: row.createdAt.toISOString()
});

export async function list(
	actor: SignedIn,
	{ search = '', cursor }: { search?: string; cursor?: string }
): Promise<{ people: PersonSummary[]; next: string | null }> {
	requireAdministrator(actor);
	const after = cursor === undefined ? undefined : decodeCursor(cursor, z.tuple([z.string(), z.uuid()]));
	const pattern = `%${search.trim().replace(/[\\%_]/g, '\\$&')}%`;
	const rows = await database()
		.select()
		.from(person)
		.where(
			and(
				search.trim() ? or(ilike(person.name, pattern), ilike(person.email, pattern)) : undefined,
				after
					? or(gt(person.name, after[0]), and(eq(person.name, after[0]), gt(person.id, after[1])))
					: undefined
			)
		)
		.orderBy(asc(person.name), asc(person.id))
		.limit(PAGE + 1);
	const shown = page(rows, PAGE, (row) => [row.name, row.id]);
	return { people: shown.rows.map(summary), next: shown.next };
}

export async function get(actor: SignedIn, id: string): Promise<PersonSummary> {
	requireAdministrator(actor);
	if (!z.uuid().safeParse(id).success) throw noSuchPerson();
	const [row] = await database().select().from(person).where(eq(person.id, id));
	if (!row) throw noSuchPerson();
	return summary(row);
}

function noSuchPerson(): NotFound {
	return new NotFound('There is no such person.');
}

/** Makes an account inside the caller's transaction. The address must be proven to be the person's. */
export async function create(
	tx: Transaction,
	account: {
		email: string;
		name: string;
		role: Role;
		actor?: string;
		roleFrom?: 'institution';
		demo?: string;
	}
): Promise<string> {
	const { actor, ...values } = account;
	const [{ id }] = await tx.insert(person).values(values).returning({ id: person.id });
	await appendAudit(tx, {
		actor: actor ?? id,
		action: 'person.create',
		objectType: 'person',
		objectId: id,
		toState: 'active',
		details: { role: account.role }
	});
	return id;
}

async function lock(tx: Transaction, id: string): Promise<typeof person.$inferSelect> {
	const [row] = await tx.select().from(person).where(eq(person.id, id)).for('update');
	if (!row || row.state === 'deleted') throw noSuchPerson();
	return row;
}

/** Ends the person's sessions, so that no session outlives the role that it began with. */
export async function changeRole(
	tx: Transaction,
	{ personId, role, actor }: { personId: string; role: Role; actor: string }
): Promise<void> {
	const row = await lock(tx, personId);
	if (row.role === role) return;
	await tx.update(person).set({ role }).where(eq(person.id, personId));
	await appendAudit(tx, {
		actor,
		action: 'person.role',
		objectType: 'person',
		objectId: personId,
		details: { from: row.role, to: role }
	});
	await endAll(tx, { personId, actor });
	if (row.email) await enqueue(tx, { letter: { kind: 'role-changed', role }, to: row.email });
}

/** The role is from now on the administrator's decision, also for an account of the institution. */
export async function setRole(actor: SignedIn, personId: string, role: Role): Promise<void> {
	requireAdministrator(actor);
	await keepingAnAdministrator(() =>
		database().transaction(async (tx) => {
			await changeRole(tx, { personId, role, actor: actor.id });
			await tx.update(person).set({ roleFrom: 'installation' }).where(eq(person.id, personId));
			await appendAudit(tx, {
				actor: actor.id,
				action: 'person.role-from',
				objectType: 'person',
				objectId: personId,
				details: { to: 'installation' }
			});
		})
	);
}

/** Ends sessions and tokens with it; what the person made stays. */
export async function removePerson(actor: SignedIn, personId: string): Promise<void> {
	requireAdministrator(actor);
	await keepingAnAdministrator(() =>
		database().transaction(async (tx) => {
			const row = await lock(tx, personId);
			if (row.state !== 'active') throw new StateError('That person has no access already.');
			await tx.update(person).set({ state: 'removed' }).where(eq(person.id, personId));
			await appendAudit(tx, {
				actor: actor.id,
				action: 'person.remove',
				objectType: 'person',
				objectId: personId,
				fromState: 'active',
				toState: 'removed'
			});
			await endAll(tx, { personId, actor: actor.id });
			await revokeAll(tx, { personId, actor: actor.id });
			if (row.email) await enqueue(tx, { letter: { kind: 'account-removed' }, to: row.email });
		})
	);
}

/** Gives access back; sessions and tokens have to be made anew. */
export async function readmit(actor: SignedIn, personId: string): Promise<void> {
	requireAdministrator(actor);
	await database().transaction(async (tx) => {
		const row = await lock(tx, personId);
		if (row.state !== 'removed') throw new StateError('That person has access already.');
		await tx.update(person).set({ state: 'active' }).where(eq(person.id, personId));
		await appendAudit(tx, {
			actor: actor.id,
			action: 'person.readmit',
			objectType: 'person',
			objectId: personId,
			fromState: 'removed',
			toState: 'active'
		});
	});
}

export async function changeProfile(actor: SignedIn, change: ProfileChange): Promise<void> {
	await database().transaction(async (tx) => {
		await tx
			.update(person)
			.set({ name: change.name, preferences: change.preferences })
			.where(eq(person.id, actor.id));
		await appendAudit(tx, {
			actor: actor.id,
			action: 'person.profile',
			objectType: 'person',
			objectId: actor.id
		});
	});
}

/** The database keeps one administrator; this says so in words. */
export async function keepingAnAdministrator<T>(work: () => Promise<T>): Promise<T> {
	try {
		return await work();
	} catch (error) {
		if (failingOf(error) !== 'person_administrator_left') throw error;
		throw new StateError(
			'This is the last administrator. Make somebody else administrator first, then repeat.'
		);
	}
}
