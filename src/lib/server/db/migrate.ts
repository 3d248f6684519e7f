import { sql } from 'drizzle-orm';
import { migrate as applyMigrations } from 'drizzle-orm/postgres-js/migrator';
import { resolve } from 'node:path';
import { connect, type Database } from './client.ts';

/** Where the migrations lie when the process starts in the folder of the application. */
const MIGRATIONS = 'drizzle';

/** Any fixed number: two processes that start at once migrate one after the other. */
const MIGRATION_LOCK = 7241866101;

/** Brings the database up to the newest migration; does nothing when it is there already. */
export async function migrate(url: string, folder = MIGRATIONS): Promise<void> {
	const { database, close } = connect(url, 1);
	try {
		await database.execute(sql`select pg_advisory_lock(${MIGRATION_LOCK})`);
		await admitApplication(database);
		await applyMigrations(database, { migrationsFolder: resolve(folder) });
	} finally {
		await close();
	}
}

/**
 * Tables that migrations make may be read and written by the role that the application runs as, where a deployment has
 * one apart from the owner. What that role may not do (the audit trail, say) a migration takes away again.
 */
async function admitApplication(database: Database): Promise<void> {
	await database.execute(sql`
		do $$ begin
			if exists (select from pg_roles where rolname = 'hairsbreadth_app') and current_user <> 'hairsbreadth_app' then
				alter default privileges in schema public
					grant select, insert, update, delete on tables to hairsbreadth_app;
				alter default privileges in schema public grant usage, select on sequences to hairsbreadth_app;
				grant usage on schema public to hairsbreadth_app;
			end if;
		end $$`);
}
