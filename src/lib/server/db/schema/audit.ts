import { sql } from 'drizzle-orm';
import { bigint, check, index, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core';
import { instant } from './columns.ts';

/**
 * Append-only: triggers refuse update, delete and truncate, and fill in `id`, `at`, `transactionId`, `previousHash` and
 * `hash`, so that a writer cannot choose them and each row seals the ones before it.
 */
export const auditEntry = pgTable(
	'audit_entry',
	{
		id: bigint({ mode: 'number' }).primaryKey(),
		at: instant().notNull(),
		/** Who did it: an account, or "installation". */
		actor: text().notNull(),
		action: text().notNull(),
		objectType: text().notNull(),
		objectId: text().notNull(),
		fromState: text(),
		toState: text(),
		details: jsonb().$type<Record<string, unknown>>().notNull(),
		transactionId: bigint({ mode: 'number' }).notNull(),
		previousHash: text().notNull(),
		hash: text().notNull()
	},
	(table) => [
		unique('audit_entry_hash_key').on(table.hash),
		unique('audit_entry_previous_hash_key').on(table.previousHash),
		check('audit_entry_actor_given', sql`length(trim(${table.actor})) > 0`),
		check('audit_entry_details_form', sql`jsonb_typeof(${table.details}) = 'object'`),
		index('audit_entry_object_index').on(table.objectType, table.objectId, table.id),
		index('audit_entry_actor_index').on(table.actor, table.id)
	]
);
