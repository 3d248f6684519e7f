import { seal } from '../auth/secrets.ts';
import { now } from '../clock.ts';
import type { Transaction } from '../db/client.ts';
import { outbox } from '../db/schema/outbox.ts';
import type { Letter } from '../mail/letters.ts';

export interface Enqueued {
	letter: Letter;
	to: string;
	/** A link that only the recipient may see; kept encrypted until it is sent. */
	secretLink?: string;
	uselessAfter?: Date;
	/** Written, so that it takes the same time and leaves the same trace, but never sent. */
	unsent?: boolean;
}

/** Inside the transaction that gives the reason: the mail goes out if and only if that commits. */
export async function enqueue(
	tx: Transaction,
	{ letter, to, secretLink, uselessAfter, unsent = false }: Enqueued
): Promise<void> {
	const at = now();
	const { kind, ...data } = letter;
	const sealed = secretLink === undefined ? null : seal(secretLink);
	await tx.insert(outbox).values({
		kind,
		recipient: to,
		data,
		sealed: unsent ? null : sealed,
		state: unsent ? 'void' : 'waiting',
		nextAttemptAt: at,
		uselessAfter,
		createdAt: at
	});
}
