import { sql } from 'drizzle-orm';
import { bigint, check, index, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { bytes, instant } from './columns.ts';
import { version } from './dataset.ts';
import { person } from './people.ts';

/** What curators have on their desks: uploads before they are drafts, what they were told, and requests sent twice. */

/** A file being read: its bytes as they came and the form as typed. Becomes a draft when its owner says so. */
export const upload = pgTable(
	'upload',
	{
		id: uuid().primaryKey().defaultRandom(),
		personId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		/** Null for a closed form, which comes without a file. */
		raw: bytes(),
		rawName: text(),
		/** As typed, so that nothing is lost by not being understood yet. */
		form: jsonb().$type<Record<string, string>>().notNull(),
		/** Counts what was saved: a second window that saves from an older one is told. */
		revision: integer().notNull().default(0),
		/** The draft that it was made into, and goes on describing. */
		versionId: uuid().references(() => version.id, { onDelete: 'restrict' }),
		createdAt: instant().notNull(),
		savedAt: instant().notNull()
	},
	(table) => [
		check('upload_raw_complete', sql`num_nonnulls(${table.raw}, ${table.rawName}) in (0, 2)`),
		check('upload_raw_size', sql`octet_length(${table.raw}) <= 5000000`),
		check('upload_form_form', sql`jsonb_typeof(${table.form}) = 'object'`),
		index('upload_person_index').on(table.personId, table.savedAt),
		index('upload_version_index').on(table.versionId)
	]
);

/** A POST with an Idempotency-Key: its answer, given again to whoever repeats it. */
export const answeredRequest = pgTable(
	'answered_request',
	{
		personId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		key: text().notNull(),
		/** sha256 of method, address and body: the same key with another request is a mistake. */
		request: text().notNull(),
		/** Null while the first one is still being answered. */
		status: integer(),
		/** JSON as text: it may hold what jsonb refuses, as a character cut in two. */
		body: text(),
		at: instant().notNull()
	},
	(table) => [
		primaryKey({ name: 'answered_request_pkey', columns: [table.personId, table.key] }),
		check('answered_request_key_length', sql`length(${table.key}) between 1 and 200`),
		index('answered_request_at_index').on(table.at)
	]
);

/** What a person was told inside the application; the mail says the same. */
export const notification = pgTable(
	'notification',
	{
		id: bigint({ mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
		personId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		kind: text().notNull(),
		data: jsonb().$type<Record<string, unknown>>().notNull(),
		createdAt: instant().notNull(),
		readAt: instant()
	},
	(table) => [
		check('notification_data_form', sql`jsonb_typeof(${table.data}) = 'object'`),
		index('notification_person_index').on(table.personId, table.id)
	]
);
