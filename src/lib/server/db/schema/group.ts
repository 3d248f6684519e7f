import { sql } from 'drizzle-orm';
import {
	boolean,
	check,
	doublePrecision,
	index,
	pgTable,
	primaryKey,
	text,
	unique,
	uuid
} from 'drizzle-orm/pg-core';
import { instant, isSlug } from './columns.ts';
import { person } from './people.ts';

export const group = pgTable(
	'group',
	{
		id: uuid().primaryKey().defaultRandom(),
		slug: text().notNull(),
		name: text().notNull(),
		createdAt: instant().notNull().defaultNow(),
		/** No longer in use; what was shared in it stays where it is. */
		closedAt: instant()
	},
	(table) => [
		unique('group_slug_key').on(table.slug),
		check('group_slug_form', isSlug(table.slug)),
		check('group_name_given', sql`length(trim(${table.name})) between 2 and 80`)
	]
);

export const membership = pgTable(
	'membership',
	{
		groupId: uuid()
			.notNull()
			.references(() => group.id, { onDelete: 'restrict' }),
		personId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		lead: boolean().notNull().default(false),
		joinedAt: instant().notNull().defaultNow()
	},
	(table) => [
		primaryKey({ name: 'membership_pkey', columns: [table.groupId, table.personId] }),
		index('membership_person_index').on(table.personId, table.groupId)
	]
);

/** What new studies of a group begin with. */
export const groupDefault = pgTable(
	'group_default',
	{
		groupId: uuid()
			.primaryKey()
			.references(() => group.id, { onDelete: 'restrict' }),
		/** How conductors' static term is taken: `drude` or `plasma`. */
		conduction: text().notNull(),
		/** Name of the version of gold; null where the group does not say. */
		gold: text(),
		temperatureK: doublePrecision().notNull(),
		changedAt: instant().notNull(),
		changedBy: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' })
	},
	(table) => [
		check('group_default_conduction_known', sql`${table.conduction} in ('drude', 'plasma')`),
		check('group_default_gold_form', sql`${table.gold} ~ '^[a-z0-9]+(-[a-z0-9]+)*@[0-9]+\\.[0-9]+$'`),
		check('group_default_temperature_range', sql`${table.temperatureK} between 0 and 3000`)
	]
);
