import { bigint, check, doublePrecision, index, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';

/**
 * What a caller has used of a limit, a row for each window of time. Kept in the database so that a limit holds across
 * processes and restarts. Rows whose window is over are swept by whoever adds the next one.
 */
export const rateCounter = pgTable(
	'rate_counter',
	{
		/** The limit and the caller, as `compute:203.0.113.7`. */
		key: text().notNull(),
		/** Start of the window in seconds since 1970. */
		windowStart: bigint('window_start', { mode: 'number' }).notNull(),
		/** Used within the window, in the unit of the limit (seconds of computing, or a count). */
		used: doublePrecision().notNull()
	},
	(table) => [
		primaryKey({ name: 'rate_counter_pkey', columns: [table.key, table.windowStart] }),
		index('rate_counter_window_start_idx').on(table.windowStart),
		check('rate_counter_used_finite', sql`${table.used} >= 0 and ${table.used} < 'Infinity'::float8`)
	]
);
