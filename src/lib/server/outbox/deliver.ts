import { and, asc, eq, lte } from 'drizzle-orm';
import { authSettings } from '../auth/settings.ts';
import { unseal } from '../auth/secrets.ts';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { FORGOTTEN, outbox } from '../db/schema/outbox.ts';
import { write } from '../mail/letters.ts';
import { render } from '../mail/render.ts';
import type { Transport } from '../mail/transport.ts';

/** First wait after a failure; each further one doubles it. */
const FIRST_WAIT_MS = 10_000;
const LONGEST_WAIT_MS = 6 * 3_600_000;
const ATTEMPTS_MAX = 14;

export type Delivery = 'nothing-due' | 'sent' | 'later' | 'given-up';

/** How long to wait before the next attempt, after so many that failed. */
export function backoffMs(attempts: number): number {
	return Math.min(LONGEST_WAIT_MS, FIRST_WAIT_MS * 2 ** Math.max(0, attempts - 1));
}

/**
 * Sends the mail that has waited longest. Its row stays locked while the mail server is spoken to, so no second process
 * sends it too. A crash between the server's yes and the commit would send it again, under the same Message-ID.
 */
export async function deliverOne(transport: Transport): Promise<Delivery> {
	return database().transaction(async (tx) => {
		const at = now();
		const [due] = await tx
			.select()
			.from(outbox)
			.where(and(eq(outbox.state, 'waiting'), lte(outbox.nextAttemptAt, at)))
			.orderBy(asc(outbox.nextAttemptAt), asc(outbox.id))
			.limit(1)
			.for('update', { skipLocked: true });
		if (!due) return 'nothing-due';
		const settle = (change: Partial<typeof outbox.$inferInsert>) =>
			tx.update(outbox).set(change).where(eq(outbox.id, due.id));

		if (due.uselessAfter && due.uselessAfter <= at) {
			await settle({ state: 'failed', sealed: null, lastError: 'It was too late to be of use.' });
			return 'given-up';
		}
		try {
			const { origin, mailFrom } = authSettings();
			const written = write(due.kind, due.data, origin, due.sealed === null ? null : unseal(due.sealed));
			await transport.send({
				...render(written),
				to: due.recipient,
				messageId: `<${due.messageId}@${mailFrom.split('@')[1]}>`
			});
		} catch (error) {
			const attempts = due.attempts + 1;
			const lastError = error instanceof Error ? error.message.slice(0, 300) : 'unknown';
			if (attempts >= ATTEMPTS_MAX) {
				await settle({ state: 'failed', sealed: null, attempts, lastError });
				return 'given-up';
			}
			await settle({ attempts, lastError, nextAttemptAt: new Date(at.getTime() + backoffMs(attempts)) });
			return 'later';
		}
		await settle({
			state: 'sent',
			sealed: null,
			attempts: due.attempts + 1,
			sentAt: now(),
			lastError: null,
			...(due.kind === 'account-deleted' ? { recipient: FORGOTTEN } : {})
		});
		return 'sent';
	});
}
