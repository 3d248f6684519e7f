import { jsonb, pgTable, text } from 'drizzle-orm/pg-core';
import { instant } from './columns.ts';

/** What the administrator of the installation has decided. */
export const setting = pgTable('setting', {
	key: text().primaryKey(),
	value: jsonb().$type<unknown>().notNull(),
	updatedAt: instant().notNull().defaultNow(),
	updatedBy: text().notNull()
});
