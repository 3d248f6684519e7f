import { and, asc, desc, eq, isNull } from 'drizzle-orm';
import { preferences, type SignedIn } from '../../schemas/person.ts';
import { appendAudit } from '../audit/append.ts';
import { endAll, list as listSessions } from '../auth/sessions.ts';
import { database, type Transaction } from '../db/client.ts';
import { auditEntry } from '../db/schema/audit.ts';
import { notification, upload } from '../db/schema/curation.ts';
import { invitation } from '../db/schema/invitation.ts';
import { accountLink, person } from '../db/schema/people.ts';
import { signInLink } from '../db/schema/session.ts';
import { FORGOTTEN, outbox } from '../db/schema/outbox.ts';
import { NotFound } from '../errors.ts';
import { list as listUploads } from '../library/uploads.ts';
import { enqueue } from '../outbox/enqueue.ts';
import { forgetStudies } from '../studies/forget.ts';
import { ownRecords } from '../records/records.ts';
import { ownScreenings } from '../screening/screenings.ts';
import { ownStudies } from '../studies/studies.ts';
import { exitAll } from './groups.ts';
import { keepingAnAdministrator } from './people.ts';
import { list as listTokens, revokeAll } from './tokens.ts';

/** What a person can do with their own account as a whole. */

const ENTRIES_MAX = 10_000;

/** Everything that is kept about a person, as one object that they may take along. */
export async function exportData(actor: SignedIn): Promise<Record<string, unknown>> {
	const [row] = await database().select().from(person).where(eq(person.id, actor.id));
	if (!row) throw new NotFound('There is no such person.');
	const links = await database()
		.select({
			provider: accountLink.provider,
			subject: accountLink.subject,
			createdAt: accountLink.createdAt
		})
		.from(accountLink)
		.where(eq(accountLink.personId, actor.id));
	const mails = await database()
		.select({ kind: outbox.kind, createdAt: outbox.createdAt, sentAt: outbox.sentAt })
		.from(outbox)
		.where(and(eq(outbox.recipient, actor.email), eq(outbox.state, 'sent')))
		.orderBy(desc(outbox.id))
		.limit(ENTRIES_MAX);
	const trail = await database()
		.select({
			at: auditEntry.at,
			action: auditEntry.action,
			objectType: auditEntry.objectType,
			objectId: auditEntry.objectId,
			details: auditEntry.details
		})
		.from(auditEntry)
		.where(eq(auditEntry.actor, actor.id))
		.orderBy(asc(auditEntry.id))
		.limit(ENTRIES_MAX);
	return {
		account: {
			id: row.id,
			name: row.name,
			email: row.email,
			role: row.role,
			createdAt: row.createdAt.toISOString(),
			preferences: preferences.parse(row.preferences)
		},
		groups: actor.groups.map(({ slug, name, lead }) => ({ slug, name, lead })),
		institution: links,
		sessions: await listSessions(actor.id, null),
		tokens: await listTokens(actor),
		mails,
		records: await ownRecords(actor),
		screenings: await ownScreenings(actor),
		studies: await ownStudies(actor),
		uploads: await listUploads(actor),
		trail
	};
}

/** Whether the institution's account can be used to sign in. */
export async function institutionLink(actor: SignedIn): Promise<{ linkedAt: string } | null> {
	const [row] = await database()
		.select({ createdAt: accountLink.createdAt })
		.from(accountLink)
		.where(eq(accountLink.personId, actor.id));
	return row ? { linkedAt: row.createdAt.toISOString() } : null;
}

/** @throws NotFound when there is nothing to part from */
export async function unlinkInstitution(actor: SignedIn): Promise<void> {
	await database().transaction(async (tx) => {
		const gone = await tx
			.delete(accountLink)
			.where(eq(accountLink.personId, actor.id))
			.returning({ personId: accountLink.personId });
		if (gone.length === 0) throw new NotFound('No account of the institution is linked.');
		await appendAudit(tx, {
			actor: actor.id,
			action: 'person.unlink',
			objectType: 'person',
			objectId: actor.id
		});
	});
}

/** Copies of the address that are not needed any more; the last mail's own goes when it is sent. */
async function forgetAddress(tx: Transaction, email: string, actor: string): Promise<void> {
	await tx
		.update(outbox)
		.set({ state: 'void', sealed: null })
		.where(and(eq(outbox.recipient, email), eq(outbox.state, 'waiting')));
	await tx.update(outbox).set({ recipient: FORGOTTEN }).where(eq(outbox.recipient, email));
	await tx.delete(signInLink).where(eq(signInLink.email, email));
	const invitations = await tx
		.update(invitation)
		.set({ email: FORGOTTEN })
		.where(eq(invitation.email, email))
		.returning({ id: invitation.id });
	for (const { id } of invitations) {
		await appendAudit(tx, { actor, action: 'invitation.forget', objectType: 'invitation', objectId: id });
	}
}

/**
 * Removes what is personal and keeps the name, under which published versions go on being cited. The address, the links,
 * the preferences, memberships, sessions and tokens go; the trail keeps what was done, by number.
 */
export async function deleteAccount(actor: SignedIn): Promise<void> {
	await keepingAnAdministrator(() =>
		database().transaction(async (tx) => {
			await exitAll(tx, actor.id);
			await endAll(tx, { personId: actor.id, actor: actor.id });
			await revokeAll(tx, { personId: actor.id, actor: actor.id });
			await tx.delete(accountLink).where(eq(accountLink.personId, actor.id));
			await tx
				.update(person)
				.set({ state: 'deleted', email: null, preferences: {}, demo: null })
				.where(eq(person.id, actor.id));
			await appendAudit(tx, {
				actor: actor.id,
				action: 'person.delete',
				objectType: 'person',
				objectId: actor.id,
				fromState: 'active',
				toState: 'deleted'
			});
			await forgetStudies(tx, actor.id);
			await tx.delete(notification).where(eq(notification.personId, actor.id));
			await tx.delete(upload).where(and(eq(upload.personId, actor.id), isNull(upload.versionId)));
			await forgetAddress(tx, actor.email, actor.id);
			await enqueue(tx, { letter: { kind: 'account-deleted' }, to: actor.email });
		})
	);
}
