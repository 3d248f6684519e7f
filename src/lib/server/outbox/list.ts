import { and, count, desc, eq, lt } from 'drizzle-orm';
import { z } from 'zod';
import { decodeCursor, page } from '../api/paginate.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { OUTBOX_STATES, outbox, type OutboxState } from '../db/schema/outbox.ts';
import { StateError } from '../errors.ts';

export interface OutgoingMail {
	id: number;
	kind: string;
	recipient: string;
	state: OutboxState;
	attempts: number;
	createdAt: string;
	sentAt: string | null;
	nextAttemptAt: string | null;
	lastError: string | null;
}

export const OUTBOX_STATE_WORDS = OUTBOX_STATES;

const PAGE = 50;

/** Newest first; never what a mail says, which may hold somebody's way in. */
export async function list({ state, cursor }: { state?: OutboxState; cursor?: string }) {
	const before = cursor === undefined ? undefined : decodeCursor(cursor, z.int());
	const rows = await database()
		.select()
		.from(outbox)
		.where(
			and(
				state ? eq(outbox.state, state) : undefined,
				before === undefined ? undefined : lt(outbox.id, before)
			)
		)
		.orderBy(desc(outbox.id))
		.limit(PAGE + 1);
	const shown = page(rows, PAGE, (row) => row.id);
	return { mails: shown.rows.map(summary), next: shown.next };
}

function summary(row: typeof outbox.$inferSelect): OutgoingMail {
	return {
		id: row.id,
		kind: row.kind,
		recipient: row.recipient,
		state: row.state,
		attempts: row.attempts,
		createdAt: row.createdAt.toISOString(),
		sentAt: row.sentAt?.toISOString() ?? null,
		nextAttemptAt: row.state === 'waiting' ? row.nextAttemptAt.toISOString() : null,
		lastError: row.lastError
	};
}

export async function countByState(): Promise<Record<OutboxState, number>> {
	const rows = await database()
		.select({ state: outbox.state, count: count() })
		.from(outbox)
		.groupBy(outbox.state);
	const counts = { waiting: 0, sent: 0, failed: 0, void: 0 };
	for (const row of rows) counts[row.state] = row.count;
	return counts;
}

/** Makes a waiting mail due now. @throws StateError for one that is not waiting */
export async function tryNow(actor: string, id: number): Promise<void> {
	await database().transaction(async (tx) => {
		const changed = await tx
			.update(outbox)
			.set({ nextAttemptAt: now() })
			.where(and(eq(outbox.id, id), eq(outbox.state, 'waiting')))
			.returning({ id: outbox.id });
		if (changed.length === 0) throw new StateError('Only a mail that is waiting can be sent now.');
		await appendAudit(tx, { actor, action: 'mail.try', objectType: 'mail', objectId: String(id) });
	});
}
