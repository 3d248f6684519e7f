import { sql, type SQL } from 'drizzle-orm';
import { customType, timestamp, type AnyPgColumn } from 'drizzle-orm/pg-core';

/** Column kinds and check texts that several tables share. */

export const bytes = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => 'bytea' });

export const instant = () => timestamp({ withTimezone: true, mode: 'date' });

/** PostgreSQL sorts NaN above Infinity, so one comparison refuses both; NULL passes. */
export const isFinite = (column: AnyPgColumn): SQL => sql`${column} > '-Infinity' and ${column} < 'Infinity'`;

/** Every element finite; the function comes with the first hand-written migration. */
export const allFinite = (column: AnyPgColumn): SQL => sql`all_finite(${column})`;

export const isSlug = (column: AnyPgColumn): SQL => sql`${column} ~ '^[a-z0-9]+(-[a-z0-9]+)*$'`;

/** Text restricted to a list; written out so that the constraint reads like the list. */
export const isOneOf = (column: AnyPgColumn, words: readonly string[]): SQL =>
	sql`${column} in (${sql.raw(words.map((word) => `'${word}'`).join(', '))})`;
