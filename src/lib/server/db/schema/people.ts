import { sql } from 'drizzle-orm';
import { check, index, jsonb, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import {
	PERSON_STATES,
	ROLES,
	type PersonState,
	type Preferences,
	type Role
} from '../../../schemas/person.ts';
import { instant, isOneOf } from './columns.ts';

/** An account. Never deleted as a row: versions and the audit trail go on naming it. */
export const person = pgTable(
	'person',
	{
		id: uuid().primaryKey().defaultRandom(),
		/** In lower case; null once the account is deleted. */
		email: text(),
		name: text().notNull(),
		role: text().$type<Role>().notNull(),
		/** Whether the institution's groups decide the role at each sign-in, or the administrator. */
		roleFrom: text().$type<'installation' | 'institution'>().notNull().default('installation'),
		state: text().$type<PersonState>().notNull().default('active'),
		preferences: jsonb().$type<Partial<Preferences>>().notNull().default({}),
		createdAt: instant().notNull().defaultNow(),
		/** Of the demonstration: such an account may be entered without a mail. */
		demo: text()
	},
	(table) => [
		unique('person_email_key').on(table.email),
		unique('person_demo_key').on(table.demo),
		check(
			'person_email_form',
			sql`${table.email} = lower(${table.email}) and position('@' in ${table.email}) > 1`
		),
		check('person_email_given', sql`(${table.state} = 'deleted') = (${table.email} is null)`),
		check('person_role_known', isOneOf(table.role, ROLES)),
		check('person_role_from_known', isOneOf(table.roleFrom, ['installation', 'institution'])),
		check('person_state_known', isOneOf(table.state, PERSON_STATES)),
		check('person_name_given', sql`length(trim(${table.name})) between 1 and 120`),
		index('person_name_index').on(table.name, table.id)
	]
);

/** Who a person is at the institution's OpenID provider. Tokens of the provider are never kept. */
export const accountLink = pgTable(
	'account_link',
	{
		provider: text().notNull(),
		subject: text().notNull(),
		personId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		createdAt: instant().notNull().defaultNow()
	},
	(table) => [
		primaryKey({ name: 'account_link_pkey', columns: [table.provider, table.subject] }),
		unique('account_link_person_key').on(table.personId, table.provider)
	]
);
