import postgres from 'postgres';
import type { TestProject } from 'vitest/node';
import { startCluster } from '../../src/launch/postgres.mjs';
import { connect } from '../../src/lib/server/db/client.ts';
import { migrate } from '../../src/lib/server/db/migrate.ts';
import { prepareQueue } from '../../src/lib/server/jobs/queue.ts';
import { seedLibrary } from '../../src/lib/server/library/seed.ts';

/**
 * One throw-away server for a run of the tests, with a migrated and seeded template that each test file copies.
 * HAIRSBREADTH_TEST_SERVER names a server that is there already; its account must be a superuser.
 */

declare module 'vitest' {
	export interface ProvidedContext {
		/** Address of the server as superuser, without a database. */
		testServer: string;
		/** Name of the database to copy. */
		testTemplate: string;
	}
}

const APPLICATION_ROLE = 'hairsbreadth_app';

export default async function setup(project: TestProject): Promise<() => Promise<void>> {
	const given = process.env.HAIRSBREADTH_TEST_SERVER;
	const cluster = given ? undefined : await startCluster({ throwaway: true });
	const server = new URL(given ?? cluster?.url ?? '');
	server.pathname = '';
	const template = `hairsbreadth_template_${process.pid}`;
	try {
		await makeTemplate(server, template);
	} catch (error) {
		await cluster?.stop();
		throw error;
	}
	project.provide('testServer', server.href);
	project.provide('testTemplate', template);
	return async () => {
		if (given)
			await asSuperuser(server, (sql) => sql.unsafe(`drop database if exists ${template} with (force)`));
		await cluster?.stop();
	};
}

async function makeTemplate(server: URL, template: string): Promise<void> {
	await asSuperuser(server, async (sql) => {
		const [role] = await sql`select from pg_roles where rolname = ${APPLICATION_ROLE}`;
		if (!role) await sql.unsafe(`create role ${APPLICATION_ROLE} login`);
		await sql.unsafe(`create database ${template}`);
	});
	const url = new URL(template, server).href;
	await migrate(url);
	await prepareQueue(url);
	const { database, close } = connect(url, 1);
	try {
		await seedLibrary(database, 'data-seed');
	} finally {
		await close();
	}
}

async function asSuperuser(server: URL, work: (sql: postgres.Sql) => Promise<unknown>): Promise<void> {
	const sql = postgres(new URL('postgres', server).href, { max: 1, onnotice: () => undefined });
	try {
		await work(sql);
	} finally {
		await sql.end({ timeout: 5 });
	}
}
