import { sql } from 'drizzle-orm';
import { boolean, check, index, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { ROLES, type Role } from '../../../schemas/person.ts';
import { bytes, instant, isOneOf } from './columns.ts';
import { group } from './group.ts';
import { person } from './people.ts';

export const invitation = pgTable(
	'invitation',
	{
		id: uuid().primaryKey().defaultRandom(),
		secretHash: bytes().notNull(),
		email: text().notNull(),
		role: text().$type<Role>().notNull(),
		groupId: uuid().references(() => group.id, { onDelete: 'restrict' }),
		lead: boolean().notNull().default(false),
		invitedBy: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		createdAt: instant().notNull(),
		expiresAt: instant().notNull(),
		acceptedAt: instant(),
		acceptedBy: uuid().references(() => person.id, { onDelete: 'restrict' }),
		revokedAt: instant()
	},
	(table) => [
		unique('invitation_secret_key').on(table.secretHash),
		check('invitation_role_known', isOneOf(table.role, ROLES)),
		check('invitation_email_form', sql`${table.email} = lower(${table.email})`),
		check('invitation_one_end', sql`num_nonnulls(${table.acceptedAt}, ${table.revokedAt}) <= 1`),
		check('invitation_acceptance_whole', sql`(${table.acceptedAt} is null) = (${table.acceptedBy} is null)`),
		check('invitation_lead_of_group', sql`not ${table.lead} or ${table.groupId} is not null`),
		index('invitation_created_index').on(table.createdAt, table.id),
		index('invitation_group_index').on(table.groupId)
	]
);
