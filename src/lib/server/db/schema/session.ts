import { sql } from 'drizzle-orm';
import { check, index, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { bytes, instant, isOneOf } from './columns.ts';
import { person } from './people.ts';

export const SESSION_BEGINNINGS = ['link', 'institution', 'invitation', 'demo'] as const;
export type SessionBeginning = (typeof SESSION_BEGINNINGS)[number];

export const session = pgTable(
	'session',
	{
		id: uuid().primaryKey().defaultRandom(),
		/** SHA-256 of what the cookie carries: who reads the table cannot sign in. */
		secretHash: bytes().notNull(),
		personId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		begunBy: text().$type<SessionBeginning>().notNull(),
		/** A few words about the browser, for the list of one's own sessions. */
		browser: text().notNull(),
		createdAt: instant().notNull(),
		lastSeenAt: instant().notNull(),
		expiresAt: instant().notNull()
	},
	(table) => [
		unique('session_secret_key').on(table.secretHash),
		check('session_begun_by_known', isOneOf(table.begunBy, SESSION_BEGINNINGS)),
		check('session_absolute_limit', sql`${table.expiresAt} <= ${table.createdAt} + interval '30 days'`),
		index('session_person_index').on(table.personId, table.lastSeenAt)
	]
);

/** A sign-in link that was asked for, for a known address or not: both leave the same trace. */
export const signInLink = pgTable(
	'sign_in_link',
	{
		id: uuid().primaryKey().defaultRandom(),
		secretHash: bytes().notNull(),
		email: text().notNull(),
		/** SHA-256 of the cookie of the browser that asked. */
		browserHash: bytes().notNull(),
		createdAt: instant().notNull(),
		expiresAt: instant().notNull(),
		usedAt: instant()
	},
	(table) => [
		unique('sign_in_link_secret_key').on(table.secretHash),
		check('sign_in_link_limit', sql`${table.expiresAt} <= ${table.createdAt} + interval '10 minutes'`),
		index('sign_in_link_expiry_index').on(table.expiresAt)
	]
);
