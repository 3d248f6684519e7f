import { sql } from 'drizzle-orm';
import { check, index, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { instant, isOneOf } from './columns.ts';
import { version } from './dataset.ts';
import { group } from './group.ts';
import { person } from './people.ts';
import { study } from './study.ts';

/** Frozen studies. A record never changes and is never removed; only who may see it is decided anew, beside it. */

export const RECORD_VISIBILITIES = ['private', 'group', 'signed-in', 'everybody'] as const;

export const record = pgTable(
	'record',
	{
		/** SHA-256 of the content in hexadecimal digits: the record's permanent name. */
		checksum: text().primaryKey(),
		/** Canonical JSON, kept as the very characters that the checksum names. */
		content: text().notNull(),
		studyId: uuid()
			.notNull()
			.references(() => study.id, { onDelete: 'restrict' }),
		/** For lists and search; the content says the same. */
		name: text().notNull(),
		frozenBy: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		frozenAt: instant().notNull()
	},
	(table) => [
		check('record_checksum_form', sql`${table.checksum} ~ '^[0-9a-f]{64}$'`),
		check(
			'record_checksum_true',
			sql`${table.checksum} = encode(sha256(convert_to(${table.content}, 'UTF8')), 'hex')`
		),
		check('record_name_given', sql`length(trim(${table.name})) between 1 and 200`),
		index('record_study_index').on(table.studyId, table.frozenAt)
	]
);

/** The versions that a record rests on: they can never go while it stands. */
export const recordPin = pgTable(
	'record_pin',
	{
		checksum: text()
			.notNull()
			.references(() => record.checksum, { onDelete: 'restrict' }),
		versionId: uuid()
			.notNull()
			.references(() => version.id, { onDelete: 'restrict' })
	},
	(table) => [
		primaryKey({ name: 'record_pin_pkey', columns: [table.checksum, table.versionId] }),
		index('record_pin_version_index').on(table.versionId)
	]
);

/** Who may see a record; the one thing about it that its owner decides after freezing. */
export const recordAccess = pgTable(
	'record_access',
	{
		checksum: text()
			.primaryKey()
			.references(() => record.checksum, { onDelete: 'restrict' }),
		ownerId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		groupId: uuid().references(() => group.id, { onDelete: 'restrict' }),
		visibility: text().$type<(typeof RECORD_VISIBILITIES)[number]>().notNull(),
		changedAt: instant().notNull()
	},
	(table) => [
		check('record_access_visibility_known', isOneOf(table.visibility, RECORD_VISIBILITIES)),
		check('record_access_group_visible', sql`${table.visibility} <> 'group' or ${table.groupId} is not null`),
		index('record_access_owner_index').on(table.ownerId, table.changedAt),
		index('record_access_group_index').on(table.groupId, table.changedAt)
	]
);
