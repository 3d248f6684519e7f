import { and, eq, gt, isNull, lt } from 'drizzle-orm';
import { now } from '../clock.ts';
import { database, type Transaction } from '../db/client.ts';
import { person } from '../db/schema/people.ts';
import { signInLink } from '../db/schema/session.ts';
import { enqueue } from '../outbox/enqueue.ts';
import { chargeClient, chargeWrong, mayMail } from './attempts.ts';
import { hashOf, newSecret } from './secrets.ts';
import { begin, type BegunSession } from './sessions.ts';
import { authSettings } from './settings.ts';

/** Sign-in by a link in a mail: ten minutes, once, by a button, and in the browser that asked for it. */

export const LINK_MINUTES = 10;
const KEPT_MS = 24 * 3_600_000;

/**
 * Writes a link and its mail. Takes the same steps for every address, known or not, so that neither the answer nor its
 * time tells which addresses have an account; for an unknown one the mail is written as never to be sent.
 *
 * @param browserSecret  what a cookie of the asking browser carries
 * @throws TooManyRequests when the client has asked too often
 */
export async function ask(request: { email: string; browserSecret: string; client: string }): Promise<void> {
	await chargeClient(request.client);
	const allowed = await mayMail(request.email);
	const at = now();
	const secret = newSecret();
	const expiresAt = new Date(at.getTime() + LINK_MINUTES * 60_000);
	await database().transaction(async (tx) => {
		const known = await activePersonId(tx, request.email);
		await tx.delete(signInLink).where(lt(signInLink.expiresAt, new Date(at.getTime() - KEPT_MS)));
		await tx.insert(signInLink).values({
			secretHash: hashOf(secret),
			email: request.email,
			browserHash: hashOf(request.browserSecret),
			createdAt: at,
			expiresAt
		});
		await enqueue(tx, {
			letter: { kind: 'sign-in-link' },
			to: request.email,
			secretLink: `${authSettings().origin}/sign-in/confirm?link=${secret}`,
			uselessAfter: expiresAt,
			unsent: known === null || !allowed
		});
	});
}

async function activePersonId(tx: Transaction, email: string): Promise<string | null> {
	const [found] = await tx
		.select({ id: person.id })
		.from(person)
		.where(and(eq(person.email, email), eq(person.state, 'active')));
	return found?.id ?? null;
}

export type LinkView = { usable: false } | { usable: true; sameBrowser: boolean };

const usable = (secret: string, at: Date) =>
	and(eq(signInLink.secretHash, hashOf(secret)), isNull(signInLink.usedAt), gt(signInLink.expiresAt, at));

/** Looks without touching: opening a link, as scanners of mail do, neither signs in nor uses it up. */
export async function look(secret: string, browserSecret: string | null): Promise<LinkView> {
	const [found] = await database()
		.select({ browserHash: signInLink.browserHash })
		.from(signInLink)
		.where(usable(secret, now()));
	if (!found) return { usable: false };
	return { usable: true, sameBrowser: isSameBrowser(found.browserHash, browserSecret) };
}

function isSameBrowser(browserHash: Buffer, browserSecret: string | null): boolean {
	return browserSecret !== null && hashOf(browserSecret).equals(browserHash);
}

export type LinkUse =
	| { kind: 'signed-in'; session: BegunSession }
	/** Another browser asked for it: this one must say that it means it. */
	| { kind: 'confirm' }
	/** Used, expired, unknown, or of an account that is gone: told apart for nobody. */
	| { kind: 'unusable' };

export async function use(request: {
	secret: string;
	browserSecret: string | null;
	/** The person has said that they asked for it in another browser. */
	confirmed: boolean;
	browser: string;
	client: string;
}): Promise<LinkUse> {
	const seen = await look(request.secret, request.browserSecret);
	if (!seen.usable) {
		await chargeWrong(request.client);
		return { kind: 'unusable' };
	}
	if (!seen.sameBrowser && !request.confirmed) return { kind: 'confirm' };
	return database().transaction(async (tx) => {
		// Of many at once the row lock lets one through; the others find it used.
		const [used] = await tx
			.update(signInLink)
			.set({ usedAt: now() })
			.where(usable(request.secret, now()))
			.returning({ email: signInLink.email });
		const personId = used ? await activePersonId(tx, used.email) : null;
		if (personId === null) return { kind: 'unusable' };
		const session = await begin(tx, { personId, begunBy: 'link', browser: request.browser });
		return { kind: 'signed-in', session };
	});
}
