import { and, eq, isNull } from 'drizzle-orm';
import { appendAudit, INSTALLATION } from '../audit/append.ts';
import { database } from '../db/client.ts';
import { person } from '../db/schema/people.ts';
import { create } from './people.ts';

/**
 * Sees to it that somebody can let the others in: makes the address of HAIRSBREADTH_ADMINISTRATOR an administrator where
 * there is none. That person then signs in by a link like everybody else.
 *
 * @returns whether the installation has an administrator
 */
export async function ensureAdministrator(email: string | undefined): Promise<boolean> {
	return database().transaction(async (tx) => {
		const [present] = await tx
			.select({ id: person.id })
			.from(person)
			.where(and(eq(person.role, 'administrator'), eq(person.state, 'active'), isNull(person.demo)))
			.limit(1);
		if (present || !email) return present !== undefined;
		const [known] = await tx.select({ id: person.id }).from(person).where(eq(person.email, email));
		if (!known) {
			await create(tx, {
				email,
				name: email.split('@')[0],
				role: 'administrator',
				actor: INSTALLATION
			});
			return true;
		}
		await tx
			.update(person)
			.set({ role: 'administrator', roleFrom: 'installation', state: 'active' })
			.where(eq(person.id, known.id));
		await appendAudit(tx, {
			actor: INSTALLATION,
			action: 'person.role',
			objectType: 'person',
			objectId: known.id,
			details: { to: 'administrator' }
		});
		return true;
	});
}
