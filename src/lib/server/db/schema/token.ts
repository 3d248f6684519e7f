import { sql } from 'drizzle-orm';
import { check, index, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { SCOPES, type Scope } from '../../../schemas/token.ts';
import { bytes, instant } from './columns.ts';
import { person } from './people.ts';

/** A personal token of the API. Revoked ones stay, so that the trail of what they did can be read. */
export const apiToken = pgTable(
	'api_token',
	{
		id: uuid().primaryKey().defaultRandom(),
		secretHash: bytes().notNull(),
		personId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		name: text().notNull(),
		beginning: text().notNull(),
		scopes: text().array().$type<Scope[]>().notNull(),
		createdAt: instant().notNull(),
		expiresAt: instant().notNull(),
		lastUsedAt: instant(),
		revokedAt: instant()
	},
	(table) => [
		unique('api_token_secret_key').on(table.secretHash),
		check('api_token_year_at_most', sql`${table.expiresAt} <= ${table.createdAt} + interval '366 days'`),
		check(
			'api_token_scopes_known',
			sql`cardinality(${table.scopes}) > 0 and ${table.scopes} <@ ${sql.raw(`array[${SCOPES.map((scope) => `'${scope}'`).join(', ')}]`)}`
		),
		index('api_token_person_index').on(table.personId, table.createdAt)
	]
);
