import { migrate as applyMigrations } from 'drizzle-orm/postgres-js/migrator';
import { resolve } from 'node:path';
import { connect } from './client.ts';

/** Where the migrations lie when the process starts in the folder of the application. */
const MIGRATIONS = 'drizzle';

/** Any fixed number: two processes that start at once migrate one after the other. */
const MIGRATION_LOCK = 7241866101;

/** Brings the database up to the newest migration; does nothing when it is there already. */
export async function migrate(url: string, folder = MIGRATIONS): Promise<void> {
	const { database, close } = connect(url, 1);
	try {
		await database.execute(`select pg_advisory_lock(${MIGRATION_LOCK})`);
		await applyMigrations(database, { migrationsFolder: resolve(folder) });
	} finally {
		await close();
	}
}
