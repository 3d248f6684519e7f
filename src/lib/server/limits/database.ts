import { sql } from 'drizzle-orm';
import { database } from '../db/client.ts';

const MUST_BE_ON = ['fsync', 'full_page_writes', 'synchronous_commit', 'data_checksums'];

/**
 * A database that could lose acknowledged work, or return it damaged without noticing, is refused.
 *
 * @param durability `throwaway` for tests, whose data are worth nothing
 */
export async function checkDatabase(durability: 'full' | 'throwaway'): Promise<void> {
	const rows = await database().execute<{ name: string; setting: string }>(
		sql`select name, setting from pg_settings where name in ${MUST_BE_ON}`
	);
	const off = rows.filter(({ setting }) => setting === 'off').map(({ name }) => name);
	if (off.length > 0 && durability === 'full') {
		throw new Error(
			`The database may lose work in a crash: ${off.join(', ')} must be on. ` +
				'For a database whose content is worth nothing, set HAIRSBREADTH_DURABILITY=throwaway.'
		);
	}
}

/** Whether a question gets an answer; the reason is in the database's own log. */
export async function databaseAnswers(): Promise<boolean> {
	try {
		await database().execute(sql`select 1`);
		return true;
	} catch {
		return false;
	}
}
