import { and, eq, isNotNull, isNull, sql } from 'drizzle-orm';
import { appendAudit, INSTALLATION } from '../audit/append.ts';
import { endAll } from '../auth/sessions.ts';
import { database, type Transaction } from '../db/client.ts';
import { group } from '../db/schema/group.ts';
import { person } from '../db/schema/people.ts';
import { createIn, enter } from '../people/groups.ts';
import { create } from '../people/people.ts';
import { revokeAll } from '../people/tokens.ts';
import { DEMO_ACCOUNTS, DEMO_GROUPS } from './accounts.ts';

/** Any fixed number: two processes that start at once seed one after the other. */
const SEED_LOCK = 7241866103;

/**
 * Fills in the Larkmoor Gap Laboratory where it is missing; running it again changes nothing.
 *
 * @throws Error when the database belongs to people, whom demo mode would expose
 */
export async function seedDemo(): Promise<void> {
	await database().transaction(async (tx) => {
		await tx.execute(sql`select pg_advisory_xact_lock(${SEED_LOCK})`);
		const [real] = await tx
			.select({ id: person.id })
			.from(person)
			.where(and(isNull(person.demo), eq(person.state, 'active')))
			.limit(1);
		if (real && !(await hasDemo(tx))) {
			throw new Error(
				'Demo mode lets anybody in as anybody, and this database holds accounts of people. Set HAIRSBREADTH_DEMO=0 or use another database.'
			);
		}
		const groups = new Map<string, string>();
		for (const wanted of DEMO_GROUPS) {
			const [known] = await tx.select({ id: group.id }).from(group).where(eq(group.slug, wanted.slug));
			groups.set(wanted.slug, known?.id ?? (await createIn(tx, INSTALLATION, { ...wanted })));
		}
		for (const account of DEMO_ACCOUNTS) {
			const [known] = await tx
				.select({ id: person.id, state: person.state })
				.from(person)
				.where(eq(person.email, account.email));
			if (known?.state === 'removed') await readmitDemo(tx, known.id);
			if (known) continue;
			const { key: demo, name, email, role } = account;
			const personId = await create(tx, { name, email, role, demo, actor: INSTALLATION });
			for (const { slug, lead } of account.groups) {
				const groupId = groups.get(slug);
				if (groupId) await enter(tx, { groupId, personId, lead, actor: INSTALLATION });
			}
		}
	});
}

async function hasDemo(tx: Transaction): Promise<boolean> {
	const [found] = await tx
		.select({ id: person.id })
		.from(person)
		.where(and(isNotNull(person.demo), eq(person.state, 'active')))
		.limit(1);
	return found !== undefined;
}

/** Whoever was removed while trying things out is there again at the next start. */
async function readmitDemo(tx: Transaction, personId: string): Promise<void> {
	await tx.update(person).set({ state: 'active' }).where(eq(person.id, personId));
	await appendAudit(tx, {
		actor: INSTALLATION,
		action: 'person.readmit',
		objectType: 'person',
		objectId: personId,
		fromState: 'removed',
		toState: 'active'
	});
}

/** When demo mode is over nobody gets in as a demo account any more, by no session and no token. */
export async function closeDemo(): Promise<void> {
	await database().transaction(async (tx) => {
		await tx.execute(sql`select pg_advisory_xact_lock(${SEED_LOCK})`);
		const left = await tx
			.select({ id: person.id })
			.from(person)
			.where(and(isNotNull(person.demo), eq(person.state, 'active')));
		for (const { id } of left) {
			await tx.update(person).set({ state: 'removed' }).where(eq(person.id, id));
			await appendAudit(tx, {
				actor: INSTALLATION,
				action: 'person.remove',
				objectType: 'person',
				objectId: id,
				fromState: 'active',
				toState: 'removed',
				details: { why: 'demo mode is off' }
			});
			await endAll(tx, { personId: id, actor: INSTALLATION });
			await revokeAll(tx, { personId: id, actor: INSTALLATION });
		}
	});
}
