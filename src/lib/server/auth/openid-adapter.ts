import type { Adapter, AdapterUser } from '@auth/core/adapters';
import { and, eq } from 'drizzle-orm';
import { randomUUID } from 'node:crypto';
import type { Role, SignedIn } from '../../schemas/person.ts';
import { appendAudit } from '../audit/append.ts';
import { database, type Transaction } from '../db/client.ts';
import { accountLink, person } from '../db/schema/people.ts';
import { enqueue } from '../outbox/enqueue.ts';
import { changeRole, create } from '../people/people.ts';
import { begin } from './sessions.ts';
import { authSettings } from './settings.ts';

/**
 * What Auth.js needs of the database for one sign-in through the institution. It calls these one by one; an account and
 * its link are nevertheless written in one transaction with their rows of the audit trail, when the link is.
 */

export interface Arrival {
	/** Who pressed the button that links; null for an ordinary sign-in. */
	linkTo: SignedIn | null;
	browser: string;
	/** What the institution's groups amount to; null where none is on the list. */
	role: Role | null;
}

type Account = { id: string; name: string; email: string | null };

const asUser = ({ id, name, email }: Account): AdapterUser => ({
	id,
	name,
	email: email ?? '',
	emailVerified: null
});

const never = (method: string) => () => {
	throw new Error(`Auth.js called ${method}, which a sign-in through the institution has no use for.`);
};

export function openIdAdapter(arrival: Arrival): Adapter {
	let newcomer: AdapterUser | null = null;

	return {
		getUserByAccount: async ({ provider, providerAccountId }) => {
			const [found] = await database()
				.select({ id: person.id, name: person.name, email: person.email })
				.from(accountLink)
				.innerJoin(person, eq(person.id, accountLink.personId))
				.where(
					and(
						eq(accountLink.provider, provider),
						eq(accountLink.subject, providerAccountId),
						eq(person.state, 'active')
					)
				);
			return found ? asUser(found) : null;
		},
		// In any state: a removed person does not come back under the same address.
		getUserByEmail: async (email) => {
			const [found] = await database()
				.select({ id: person.id, name: person.name, email: person.email })
				.from(person)
				.where(eq(person.email, email.toLowerCase()));
			return found ? asUser(found) : null;
		},
		createUser: async (user) => {
			newcomer = { ...user, id: randomUUID() };
			return newcomer;
		},
		linkAccount: async ({ userId, provider, providerAccountId }) => {
			await database().transaction(async (tx) => {
				if (newcomer?.id === userId) {
					newcomer = { ...newcomer, id: await createNewcomer(tx, newcomer, arrival.role) };
					await writeLink(tx, newcomer.id, provider, providerAccountId);
					return;
				}
				if (arrival.linkTo?.id !== userId) throw new Error('An account was to be linked without its owner.');
				await writeLink(tx, userId, provider, providerAccountId);
				await enqueue(tx, {
					letter: {
						kind: 'institution-linked',
						institution: authSettings().openId?.name ?? 'your institution'
					},
					to: arrival.linkTo.email
				});
			});
		},
		createSession: async ({ userId }) => {
			const personId = newcomer ? newcomer.id : userId;
			const begun = await database().transaction(async (tx) => {
				await followRole(tx, personId, arrival.role);
				return begin(tx, { personId, begunBy: 'institution', browser: arrival.browser });
			});
			return { sessionToken: begun.secret, userId: personId, expires: begun.expiresAt };
		},
		getSessionAndUser: async (sessionToken) => {
			const { linkTo } = arrival;
			if (!linkTo) return null;
			const expires = new Date(Date.now() + 60_000);
			return { session: { sessionToken, userId: linkTo.id, expires }, user: asUser(linkTo) };
		},
		getUser: never('getUser'),
		updateUser: never('updateUser'),
		updateSession: never('updateSession'),
		deleteSession: never('deleteSession')
	};
}

async function createNewcomer(tx: Transaction, newcomer: AdapterUser, role: Role | null): Promise<string> {
	if (!role) throw new Error('A newcomer needs a role from the list.');
	const email = newcomer.email.toLowerCase();
	const name = (newcomer.name ?? '').trim().slice(0, 120) || email.split('@')[0];
	return create(tx, { email, name, role, roleFrom: 'institution' });
}

async function writeLink(
	tx: Transaction,
	personId: string,
	provider: string,
	subject: string
): Promise<void> {
	await tx.insert(accountLink).values({ provider, subject, personId });
	await appendAudit(tx, {
		actor: personId,
		action: 'person.link',
		objectType: 'person',
		objectId: personId,
		details: { provider }
	});
}

/** An account that the institution made has the role that the institution's groups give it today. */
async function followRole(tx: Transaction, personId: string, role: Role | null): Promise<void> {
	const [current] = await tx
		.select({ roleFrom: person.roleFrom, role: person.role })
		.from(person)
		.where(eq(person.id, personId))
		.for('update');
	if (current?.roleFrom !== 'institution' || !role || current.role === role) return;
	await changeRole(tx, { personId, role, actor: 'institution' });
}
