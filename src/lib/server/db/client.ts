import { drizzle, type PostgresJsDatabase } from 'drizzle-orm/postgres-js';
import postgres from 'postgres';
import { config } from '../config.ts';
import * as audit from './schema/audit.ts';
import * as dataset from './schema/dataset.ts';
import * as material from './schema/material.ts';
import * as setting from './schema/setting.ts';
import * as source from './schema/source.ts';

export const schema = { ...audit, ...dataset, ...material, ...setting, ...source };

export type Database = PostgresJsDatabase<typeof schema>;

/** What runs inside a transaction; services take it as an argument so that they compose. */
export type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0];

/** Either: reading works the same inside and outside a transaction. */
export type Executor = Database | Transaction;

const POOL_SIZE = 10;

export interface Connection {
	database: Database;
	close: () => Promise<void>;
}

/** A client of its own, for the preparation and for tests; everything else shares `database()`. */
export function connect(url: string, poolSize = POOL_SIZE): Connection {
	// Notices would be printed to the console by default ("schema exists, skipping").
	const client = postgres(url, { max: poolSize, onnotice: () => undefined });
	return {
		database: drizzle(client, { schema, casing: 'snake_case' }),
		close: () => client.end({ timeout: 5 })
	};
}

let shared: Connection | undefined;

/** The pool of this process, opened on first use: a build and a check of types need no database. */
export function database(): Database {
	shared ??= connect(config().databaseUrl);
	return shared.database;
}

/** Closed pools open again on the next use. */
export async function closeDatabase(): Promise<void> {
	const open = shared;
	shared = undefined;
	await open?.close();
}
