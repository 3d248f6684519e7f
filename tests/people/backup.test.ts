import { mkdtempSync, readFileSync, rmSync, writeFileSync, chmodSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import postgres from 'postgres';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { run } from '../../src/launch/command.mjs';
import { startCluster } from '../../src/launch/postgres.mjs';
import { useDatabase } from '../support/database.ts';

/** The drill: a backup of a database with people in it, put into a cluster that has never seen it. */

const database = useDatabase();
const folder = mkdtempSync(join(tmpdir(), 'hairsbreadth-backup-'));
chmodSync(folder, 0o755);
let fresh: Awaited<ReturnType<typeof startCluster>>;
let made: string;

const launch = (script: string, args: string[], url: string) =>
	run(process.execPath, [`src/launch/${script}`, ...args], {
		env: { ...process.env, HAIRSBREADTH_DATABASE_URL: url, HAIRSBREADTH_DATABASE_OWNER_URL: url }
	});

beforeAll(async () => {
	process.env.HAIRSBREADTH_DEMO = '1';
	process.env.HOST = '127.0.0.1';
	const { seedDemo } = await import('../../src/lib/server/demo/seed.ts');
	await seedDemo();
	fresh = await startCluster({ throwaway: true });
	const { code, stdout, output } = await launch('backup.mjs', [folder], database.url);
	expect(code, output).toBe(0);
	made = stdout.trim();
}, 60_000);
afterAll(async () => {
	await fresh?.stop();
	rmSync(folder, { recursive: true, force: true });
});

describe('a backup', () => {
	it('is restored into a fresh cluster with every row, every checksum and the whole chain', async () => {
		const { code, output } = await launch('restore.mjs', [made], fresh.url);
		expect(output).toMatch(/^Restored: \d+ tables with \d+ rows/);
		expect(code).toBe(0);
		const restored = postgres(fresh.url, { max: 1, onnotice: () => undefined });
		try {
			for (const table of ['person', 'version', 'audit_entry', 'membership', 'material']) {
				const count = async (sql: postgres.Sql) =>
					Number((await sql.unsafe(`select count(*) from ${table}`))[0].count);
				const rows = await count(restored);
				expect(rows).toBeGreaterThan(0);
				// The backup wrote its own row after the moment that it shows.
				expect(rows).toBe((await count(database.sql)) - (table === 'audit_entry' ? 1 : 0));
			}
			const [{ broken }] = await restored`select audit_chain_break() as broken`;
			expect(broken).toBeNull();
			// What keeps the data also came along.
			await expect(
				restored`update version set note = 'changed' where state = 'published'`
			).rejects.toMatchObject({
				constraint_name: 'version_immutable'
			});
			await expect(restored`delete from audit_entry`).rejects.toMatchObject({
				constraint_name: 'audit_entry_append_only'
			});
		} finally {
			await restored.end();
		}
	}, 60_000);

	it('does not overwrite a database unless told to', async () => {
		const refused = await launch('restore.mjs', [made], fresh.url);
		expect(refused.code).toBe(1);
		expect(refused.output).toContain('--replace');
		const replaced = await launch('restore.mjs', [made, '--replace'], fresh.url);
		expect(replaced.output).toMatch(/^Restored/);
	}, 60_000);

	it('is refused when one byte of it has changed', async () => {
		const dump = join(made, 'database.dump');
		const bytes = readFileSync(dump);
		const changed = Buffer.from(bytes);
		changed[bytes.length >> 1] ^= 1;
		writeFileSync(dump, changed);
		const { code, output } = await launch('restore.mjs', [made, '--replace'], fresh.url);
		writeFileSync(dump, bytes);
		expect(code).toBe(1);
		expect(output).toContain('Nothing was changed');
	});

	it('is refused when the manifest speaks of other content', async () => {
		const file = join(made, 'manifest.json');
		const text = readFileSync(file, 'utf8');
		const manifest = JSON.parse(text);
		manifest.content.tables['public.person'].rows += 1;
		writeFileSync(file, JSON.stringify(manifest));
		const { code, output } = await launch('restore.mjs', [made, '--replace'], fresh.url);
		writeFileSync(file, text);
		expect(code).toBe(1);
		expect(output).toContain('public.person has');
	}, 60_000);

	it('leaves a row in the trail, where the page about health finds it', async () => {
		const rows = await database.sql`select from audit_entry where action = 'installation.backup'`;
		expect(rows).toHaveLength(1);
	});
});

describe('the command that verifies the chain', () => {
	it('is content with the trail as it is, and finds a row that was changed behind the triggers', async () => {
		expect(await launch('audit-verify.mjs', [], database.url)).toMatchObject({ code: 0 });
		await database.sql.begin(async (sql) => {
			await sql`alter table audit_entry disable trigger audit_entry_refuse_change`;
			await sql`update audit_entry set actor = 'somebody else' where id = 7`;
			await sql`alter table audit_entry enable trigger audit_entry_refuse_change`;
		});
		const { code, output } = await launch('audit-verify.mjs', [], database.url);
		expect(code).toBe(1);
		expect(output).toContain('Row 7');
	});
});
