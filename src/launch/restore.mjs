/**
 * `npm run restore -- folder [--replace]`: puts a backup back and holds every table against the manifest. Into an empty
 * database only, unless told to replace what is there.
 */
import { realpathSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import { parseArgs } from 'node:util';
import postgres from 'postgres';
import { differences, readContent } from './backup-content.mjs';
import { sha256Of } from './backup.mjs';
import { LaunchError, mustRun } from './command.mjs';
import { forProgram, ownerDatabase } from './owner-database.mjs';
import { findPostgres } from './postgres-install.mjs';

/**
 * @param {string} url
 * @param {string} folder
 * @param {{ replace?: boolean }} [options]
 * @returns {Promise<{ tables: number, rows: number }>} what was compared and found equal
 */
export async function restore(url, folder, { replace = false } = {}) {
	/** @type {import('./backup-content.mjs').Manifest} */
	const manifest = JSON.parse(await readFile(join(folder, 'manifest.json'), 'utf8'));
	const dump = join(folder, manifest.dump.file);
	if ((await sha256Of(dump)) !== manifest.dump.sha256) {
		throw new LaunchError(`${dump} is not the file that the manifest speaks of. Nothing was changed.`);
	}
	const sql = postgres(url, { max: 1, onnotice: () => undefined });
	try {
		const [{ present }] = await sql`
			select count(*)::int as present from pg_tables where schemaname in ('public', 'drizzle')`;
		if (present > 0 && !replace) {
			throw new LaunchError(
				'The database is not empty. Stop the application and say --replace to put the backup in its place.'
			);
		}
		if (present > 0) {
			await sql.begin(async (tx) => {
				// What waits in the queue comes back with the backup; chunks that were done since are done again.
				await tx`drop schema if exists pgboss cascade`;
				await tx`drop schema if exists drizzle cascade`;
				await tx`drop schema public cascade`;
				await tx`create schema public`;
			});
		}
		const { folder: bin } = await findPostgres();
		const { dbname, env } = forProgram(url);
		const flags = ['--exit-on-error', '--single-transaction', '--no-owner', `--dbname=${dbname}`, dump];
		await mustRun(join(bin, 'pg_restore'), flags, { env });
		const found = await sql.begin('isolation level repeatable read read only', readContent);
		const different = differences(manifest.content, found);
		if (different.length > 0) {
			throw new LaunchError(`The restored database is not what was backed up:\n${different.join('\n')}`);
		}
		const tables = Object.values(found.tables);
		return { tables: tables.length, rows: tables.reduce((sum, { rows }) => sum + rows, 0) };
	} finally {
		await sql.end({ timeout: 5 });
	}
}

if (import.meta.filename === realpathSync(process.argv[1])) {
	const { values, positionals } = parseArgs({
		allowPositionals: true,
		options: { replace: { type: 'boolean', default: false } }
	});
	if (positionals.length !== 1) {
		console.error('Say which backup: npm run restore -- folder [--replace]');
		process.exit(2);
	}
	const database = await ownerDatabase();
	try {
		const { tables, rows } = await restore(database.url, resolve(positionals[0]), values);
		console.log(
			`Restored: ${tables} tables with ${rows} rows, each equal to the manifest; the audit chain is whole.`
		);
	} catch (error) {
		console.error(error instanceof Error ? error.message : String(error));
		process.exitCode = 1;
	} finally {
		await database.stop();
	}
}
