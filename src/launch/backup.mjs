/**
 * `npm run backup [-- folder]`: one folder with a dump in PostgreSQL's custom format and a manifest that says what is in
 * it. The application may run meanwhile: dump and manifest see the same moment.
 */
import { createHash } from 'node:crypto';
import { createReadStream, realpathSync } from 'node:fs';
import { mkdir, open, rename, rm, stat } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import postgres from 'postgres';
import { readContent } from './backup-content.mjs';
import { LaunchError, mustRun } from './command.mjs';
import { forProgram, ownerDatabase } from './owner-database.mjs';
import { findPostgres } from './postgres-install.mjs';
import { stateFile } from './place.mjs';

const DUMP = 'database.dump';
const MANIFEST = 'manifest.json';

/**
 * @param {string} file
 * @returns {Promise<string>}
 */
export async function sha256Of(file) {
	const hash = createHash('sha256');
	for await (const chunk of createReadStream(file)) hash.update(chunk);
	return hash.digest('hex');
}

/**
 * @param {string} url
 * @param {string} parent
 * @returns {Promise<string>} the folder of the backup
 */
export async function backup(url, parent) {
	const made = new Date().toISOString();
	const target = join(parent, `hairsbreadth-${made.replace(/[-:]|\.\d+/g, '')}`);
	const draft = `${target}.partial`;
	await mkdir(draft, { recursive: true, mode: 0o700 });
	const sql = postgres(url, { max: 1, onnotice: () => undefined });
	try {
		const { folder } = await findPostgres();
		await sql.begin('isolation level repeatable read read only', async (tx) => {
			const [{ snapshot, server }] = await tx`
				select pg_export_snapshot() as snapshot, current_setting('server_version') as server`;
			const dump = join(draft, DUMP);
			const { dbname, env } = forProgram(url);
			const flags = ['--format=custom', `--snapshot=${snapshot}`, `--file=${dump}`, `--dbname=${dbname}`];
			await mustRun(join(folder, 'pg_dump'), flags, { env });
			/** @type {import('./backup-content.mjs').Manifest} */
			const manifest = {
				format: 1,
				made,
				server,
				dump: { file: DUMP, bytes: (await stat(dump)).size, sha256: await sha256Of(dump) },
				content: await readContent(tx)
			};
			await writeSafely(join(draft, MANIFEST), `${JSON.stringify(manifest, null, '\t')}\n`);
		});
		await sync(join(draft, DUMP));
		await rename(draft, target);
		await sql`insert into audit_entry (actor, action, object_type, object_id, details)
			values ('installation', 'installation.backup', 'installation', 'backup', '{}')`;
		return target;
	} catch (error) {
		await rm(draft, { recursive: true, force: true });
		throw error;
	} finally {
		await sql.end({ timeout: 5 });
	}
}

/**
 * @param {string} file
 * @param {string} text
 */
async function writeSafely(file, text) {
	const handle = await open(file, 'wx', 0o600);
	try {
		await handle.writeFile(text);
		await handle.sync();
	} finally {
		await handle.close();
	}
}

/** @param {string} file */
async function sync(file) {
	const handle = await open(file, 'r');
	try {
		await handle.sync();
	} finally {
		await handle.close();
	}
}

if (import.meta.filename === realpathSync(process.argv[1])) {
	const database = await ownerDatabase();
	try {
		console.log(await backup(database.url, resolve(process.argv[2] ?? stateFile('backups'))));
	} catch (error) {
		console.error(error instanceof LaunchError || error instanceof Error ? error.message : String(error));
		process.exitCode = 1;
	} finally {
		await database.stop();
	}
}
