import { sql } from 'drizzle-orm';
import { bigint, check, index, integer, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { instant, isOneOf } from './columns.ts';

export const OUTBOX_STATES = ['waiting', 'sent', 'failed', 'void'] as const;
export type OutboxState = (typeof OUTBOX_STATES)[number];

/** Stands where the address of a deleted account stood. */
export const FORGOTTEN = 'deleted account';

/** Mail that a transaction decided to send: written with it, sent afterwards. */
export const outbox = pgTable(
	'outbox',
	{
		id: bigint({ mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
		/** Part of the Message-ID, so that a mail server can drop a second copy. */
		messageId: uuid().notNull().defaultRandom(),
		kind: text().notNull(),
		recipient: text().notNull(),
		data: jsonb().$type<Record<string, unknown>>().notNull(),
		/** What the mail says in secret (a link), encrypted with the installation's key; gone once it is sent. */
		sealed: text(),
		state: text().$type<OutboxState>().notNull().default('waiting'),
		attempts: integer().notNull().default(0),
		nextAttemptAt: instant().notNull(),
		/** After this it makes no sense to send it. */
		uselessAfter: instant(),
		createdAt: instant().notNull(),
		sentAt: instant(),
		lastError: text()
	},
	(table) => [
		check('outbox_state_known', isOneOf(table.state, OUTBOX_STATES)),
		check('outbox_sent_whole', sql`(${table.state} = 'sent') = (${table.sentAt} is not null)`),
		check('outbox_secret_forgotten', sql`${table.state} = 'waiting' or ${table.sealed} is null`),
		index('outbox_due_index')
			.on(table.nextAttemptAt)
			.where(sql`${table.state} = 'waiting'`),
		index('outbox_list_index').on(table.id.desc())
	]
);
