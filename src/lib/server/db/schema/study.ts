import { sql } from 'drizzle-orm';
import {
	check,
	doublePrecision,
	index,
	integer,
	jsonb,
	pgTable,
	primaryKey,
	text,
	unique,
	uuid
} from 'drizzle-orm/pg-core';
import { instant, isOneOf } from './columns.ts';
import { version } from './dataset.ts';
import { group } from './group.ts';
import { person } from './people.ts';

/** Studies that somebody saved: what their address says, a name, notes, and every state that they went through. */

export const VISIBILITIES = ['private', 'group', 'signed-in'] as const;
export type Visibility = (typeof VISIBILITIES)[number];

export const study = pgTable(
	'study',
	{
		id: uuid().primaryKey().defaultRandom(),
		ownerId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		groupId: uuid().references(() => group.id, { onDelete: 'restrict' }),
		visibility: text().$type<Visibility>().notNull().default('private'),
		name: text().notNull(),
		/** The whole arrangement with its choices, as the query of an address. */
		query: text().notNull(),
		notes: text().notNull().default(''),
		/** Why each choice is there, in their order. */
		reasons: jsonb().$type<string[]>().notNull().default([]),
		/** Counts what was saved: whoever saves from an older state is told. */
		revision: integer().notNull().default(1),
		createdAt: instant().notNull(),
		savedAt: instant().notNull(),
		savedBy: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		archivedAt: instant()
	},
	(table) => [
		check('study_name_given', sql`length(trim(${table.name})) between 1 and 200`),
		check('study_query_form', sql`${table.query} like '?%' and length(${table.query}) <= 20000`),
		check('study_notes_length', sql`length(${table.notes}) <= 20000`),
		check('study_reasons_form', sql`jsonb_typeof(${table.reasons}) = 'array'`),
		check('study_visibility_known', isOneOf(table.visibility, VISIBILITIES)),
		check('study_group_visible', sql`${table.visibility} <> 'group' or ${table.groupId} is not null`),
		index('study_owner_index').on(table.ownerId, table.savedAt.desc().nullsFirst(), table.id),
		index('study_group_index').on(table.groupId, table.savedAt.desc().nullsFirst(), table.id),
		index('study_shared_index').on(table.visibility, table.savedAt.desc().nullsFirst(), table.id)
	]
);

/** Every state of a study, the present one included. Rows are added and never changed. */
export const studyChange = pgTable(
	'study_change',
	{
		studyId: uuid()
			.notNull()
			.references(() => study.id, { onDelete: 'restrict' }),
		revision: integer().notNull(),
		name: text().notNull(),
		query: text().notNull(),
		notes: text().notNull(),
		reasons: jsonb().$type<string[]>().notNull(),
		by: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		at: instant().notNull()
	},
	(table) => [primaryKey({ name: 'study_change_pkey', columns: [table.studyId, table.revision] })]
);

/** The exact versions that the present state of a study rests on. */
export const studyPin = pgTable(
	'study_pin',
	{
		studyId: uuid()
			.notNull()
			.references(() => study.id, { onDelete: 'restrict' }),
		versionId: uuid()
			.notNull()
			.references(() => version.id, { onDelete: 'restrict' })
	},
	(table) => [
		primaryKey({ name: 'study_pin_pkey', columns: [table.studyId, table.versionId] }),
		index('study_pin_version_index').on(table.versionId)
	]
);

/** What people say to each other about a study, one of its choices, or one separation. */
export const studyComment = pgTable(
	'study_comment',
	{
		id: uuid().primaryKey().defaultRandom(),
		studyId: uuid()
			.notNull()
			.references(() => study.id, { onDelete: 'restrict' }),
		personId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		text: text().notNull(),
		/** Place of the choice that is meant; null for the study as a whole. */
		choice: integer(),
		/** The separation that is meant. */
		separationNm: doublePrecision(),
		createdAt: instant().notNull(),
		resolvedAt: instant(),
		resolvedBy: uuid().references(() => person.id, { onDelete: 'restrict' })
	},
	(table) => [
		check('study_comment_given', sql`length(trim(${table.text})) between 1 and 4000`),
		check('study_comment_choice_range', sql`${table.choice} between 0 and 4`),
		check(
			'study_comment_separation_range',
			sql`${table.separationNm} > 0 and ${table.separationNm} < 'Infinity'`
		),
		check(
			'study_comment_resolved_whole',
			sql`num_nonnulls(${table.resolvedAt}, ${table.resolvedBy}) in (0, 2)`
		),
		index('study_comment_study_index').on(table.studyId, table.createdAt)
	]
);

/** Addresses by which anybody reads a study without signing in, until they run out or are taken back. */
export const studyLink = pgTable(
	'study_link',
	{
		id: uuid().primaryKey().defaultRandom(),
		studyId: uuid()
			.notNull()
			.references(() => study.id, { onDelete: 'restrict' }),
		/** SHA-256 of the secret in the address, which is shown once and not kept. */
		secretHash: text().notNull(),
		createdBy: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		createdAt: instant().notNull(),
		expiresAt: instant().notNull(),
		revokedAt: instant()
	},
	(table) => [
		unique('study_link_secret_key').on(table.secretHash),
		check('study_link_secret_form', sql`${table.secretHash} ~ '^[0-9a-f]{64}$'`),
		check('study_link_expires_later', sql`${table.expiresAt} > ${table.createdAt}`),
		index('study_link_study_index').on(table.studyId, table.createdAt)
	]
);
