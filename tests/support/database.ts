import postgres from 'postgres';
import { afterAll, beforeAll, inject } from 'vitest';
import { connect, type Connection, type Database } from '../../src/lib/server/db/client.ts';

/** A database of its own for a test file: a copy of the migrated and seeded template. */

export interface TestDatabase {
	/** Address as superuser, who owns the tables. */
	url: string;
	/** Address as the role that the application runs as. */
	applicationUrl: string;
	database: Database;
	/** For statements that the services would never send. */
	sql: postgres.Sql;
	/** The same as the role that the application runs as. */
	applicationSql: postgres.Sql;
}

let made = 0;

export async function freshDatabase(): Promise<TestDatabase & { drop: () => Promise<void> }> {
	const server = inject('testServer');
	const name = `hairsbreadth_test_${process.pid}_${++made}`;
	await onServer(server, `create database ${name} template ${inject('testTemplate')}`);
	const url = new URL(name, server);
	const application = new URL(url);
	application.username = 'hairsbreadth_app';
	const connection: Connection = connect(url.href, 4);
	const quiet = { max: 4, onnotice: () => undefined };
	const sql = postgres(url.href, quiet);
	const applicationSql = postgres(application.href, quiet);
	return {
		url: url.href,
		applicationUrl: application.href,
		database: connection.database,
		sql,
		applicationSql,
		drop: async () => {
			await Promise.all([connection.close(), sql.end({ timeout: 5 }), applicationSql.end({ timeout: 5 })]);
			await onServer(server, `drop database ${name} with (force)`);
		}
	};
}

/**
 * `freshDatabase` for a whole file, which the services' own `database()` uses too. Called at the top of the file; the
 * members are there from the first hook on.
 */
export function useDatabase(): TestDatabase {
	const box: Partial<TestDatabase> = {};
	let drop: (() => Promise<void>) | undefined;
	beforeAll(async () => {
		const fresh = await freshDatabase();
		drop = fresh.drop;
		Object.assign(box, fresh);
		process.env.HAIRSBREADTH_DATABASE_URL = fresh.applicationUrl;
	});
	afterAll(async () => {
		const { closeDatabase } = await import('../../src/lib/server/db/client.ts');
		await closeDatabase();
		await drop?.();
	});
	return box as TestDatabase;
}

async function onServer(server: string, statement: string): Promise<void> {
	const sql = postgres(new URL('postgres', server).href, { max: 1, onnotice: () => undefined });
	try {
		await sql.unsafe(statement);
	} finally {
		await sql.end({ timeout: 5 });
	}
}
