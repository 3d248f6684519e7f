import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import {
	chmodSync,
	existsSync,
	mkdirSync,
	mkdtempSync,
	readFileSync,
	readdirSync,
	rmSync,
	statSync,
	writeFileSync
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import postgres from 'postgres';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { isRoot } from './debian.mjs';
import { isFree } from './free-port.mjs';
import { startCluster, type Cluster } from './postgres.mjs';

const PATIENCE_MS = 60_000;

let directory = '';
let children: ChildProcess[] = [];
beforeEach(() => {
	directory = mkdtempSync(join(tmpdir(), 'kept-'));
	chmodSync(directory, 0o755);
});
afterEach(async () => {
	for (const child of children) if (child.exitCode === null) child.kill('SIGKILL');
	children = [];
	// Whatever a test left running is taken over by this start and stopped by its end.
	if (existsSync(join(directory, 'cluster-home'))) {
		await (await startCluster({ directory })).stop();
		rmSync(readFileSync(join(directory, 'cluster-home'), 'utf8').trim(), { recursive: true, force: true });
	}
	rmSync(directory, { recursive: true, force: true });
});

async function ask<T extends object>(url: string, statement: string): Promise<T[]> {
	const sql = postgres(url, { max: 1, connect_timeout: 5, onnotice: () => undefined });
	try {
		return (await sql.unsafe<T[]>(statement)) as T[];
	} finally {
		await sql.end();
	}
}

/** A process of its own that uses the cluster until it is told to stop. */
async function otherUser(): Promise<{ child: ChildProcess; port: number }> {
	const script = `
		const { startCluster } = await import(${JSON.stringify(new URL('./postgres.mjs', import.meta.url).href)});
		const cluster = await startCluster({ directory: ${JSON.stringify(directory)} });
		console.log(cluster.port);
		process.stdin.once('data', async () => { await cluster.stop(); process.exit(); });`;
	const child = spawn(process.execPath, ['--input-type=module', '-e', script], {
		stdio: ['pipe', 'pipe', 'inherit']
	});
	children.push(child);
	const [line] = await once(child.stdout, 'data');
	return { child, port: Number(String(line)) };
}

async function tellToStop({ child }: { child: ChildProcess }): Promise<void> {
	child.stdin?.write('stop\n');
	await once(child, 'exit');
}

const stopped = async ({ port }: { port: number }) => isFree(port);

describe('a kept cluster', () => {
	it(
		'has what keeps work safe and lets nobody in without a password',
		async () => {
			const cluster = await startCluster({ directory });
			const [row] = await ask<Record<string, string>>(
				cluster.url,
				`select current_setting('fsync') fsync, current_setting('full_page_writes') pages,
				current_setting('synchronous_commit') commits, current_setting('data_checksums') checksums,
				current_setting('listen_addresses') addresses, current_setting('server_encoding') encoding`
			);
			expect(row).toEqual({
				fsync: 'on',
				pages: 'on',
				commits: 'on',
				checksums: 'on',
				addresses: '127.0.0.1',
				encoding: 'UTF8'
			});
			const withoutPassword = new URL(cluster.url);
			withoutPassword.password = '';
			await expect(ask(withoutPassword.href, 'select 1')).rejects.toThrow();
			const superuser = new URL(cluster.url);
			superuser.username = 'postgres';
			await expect(ask(superuser.href, 'select 1')).rejects.toThrow();
			expect(statSync(join(directory, 'cluster-passwords.json')).mode & 0o777).toBe(0o600);
			await cluster.stop();
		},
		PATIENCE_MS
	);

	it(
		'gives the application rows and the owner tables',
		async () => {
			const cluster = await startCluster({ directory });
			await ask(cluster.ownerUrl, 'create table thing (id int primary key)');
			await ask(cluster.url, 'insert into thing values (1)');
			expect(await ask(cluster.url, 'select id from thing')).toEqual([{ id: 1 }]);
			await expect(ask(cluster.url, 'create table other (id int)')).rejects.toThrow(/permission denied/);
			await expect(ask(cluster.url, 'drop table thing')).rejects.toThrow(/must be owner/);
			const [role] = await ask(
				cluster.ownerUrl,
				'select rolsuper from pg_roles where rolname = current_user'
			);
			expect(role).toEqual({ rolsuper: false });
			await cluster.stop();
		},
		PATIENCE_MS
	);

	it(
		'is found again with its data, its port and its passwords',
		async () => {
			const first = await startCluster({ directory });
			await ask(first.ownerUrl, 'create table thing (id int); insert into thing values (7)');
			await first.stop();
			expect(await stopped(first)).toBe(true);
			const second = await startCluster({ directory });
			expect([second.port, second.url]).toEqual([first.port, first.url]);
			expect(await ask(second.url, 'select id from thing')).toEqual([{ id: 7 }]);
			await second.stop();
		},
		PATIENCE_MS
	);

	it(
		'is shared, and stopped by the last who uses it',
		async () => {
			const [one, two] = await Promise.all([otherUser(), otherUser()]);
			expect(one.port).toBe(two.port);
			await tellToStop(one);
			expect(await stopped(two)).toBe(false);
			await tellToStop(two);
			expect(await stopped(two)).toBe(true);
		},
		PATIENCE_MS
	);

	it(
		'is taken over from a process that was killed',
		async () => {
			const killed = await otherUser();
			killed.child.kill('SIGKILL');
			await once(killed.child, 'exit');
			expect(await stopped(killed)).toBe(false);
			const next = await startCluster({ directory });
			expect(next.port).toBe(killed.port);
			await next.stop();
			expect(await stopped(next)).toBe(true);
		},
		PATIENCE_MS
	);

	it(
		'starts in spite of a pid file that names a process which is something else by now',
		async () => {
			const first = await startCluster({ directory });
			await first.stop();
			const home = readFileSync(join(directory, 'cluster-home'), 'utf8').trim();
			const stranger = spawn('sleep', ['60']);
			children.push(stranger);
			writeFileSync(
				join(home, 'data', 'postmaster.pid'),
				`${stranger.pid}\n${home}/data\n1\n${first.port}\n`
			);
			const second = await startCluster({ directory });
			expect(await ask(second.url, 'select 1 one')).toEqual([{ one: 1 }]);
			await second.stop();
			expect(stranger.exitCode).toBeNull();
		},
		PATIENCE_MS
	);

	it(
		'takes another port when somebody has its own',
		async () => {
			const first = await startCluster({ directory });
			await first.stop();
			const { createServer } = await import('node:net');
			const squatter = createServer().listen(first.port, '127.0.0.1');
			await once(squatter, 'listening');
			const second = await startCluster({ directory });
			expect(second.port).not.toBe(first.port);
			await second.stop();
			squatter.close();
		},
		PATIENCE_MS
	);

	it(
		'stands elsewhere when the account of the server cannot enter the folder',
		async () => {
			chmodSync(directory, 0o700);
			const nested = join(directory, 'clone');
			mkdirSync(nested);
			const cluster = await startCluster({ directory: nested });
			const home = readFileSync(join(nested, 'cluster-home'), 'utf8').trim();
			expect(await ask(cluster.url, 'select 1 one')).toEqual([{ one: 1 }]);
			await cluster.stop();
			const again = await startCluster({ directory: nested });
			expect(again.url).toBe(cluster.url);
			await again.stop();
			expect(home.startsWith(isRoot() ? '/var/lib/hairsbreadth/' : nested)).toBe(true);
			rmSync(home, { recursive: true });
		},
		PATIENCE_MS
	);

	it(
		'works from a folder whose name is too long for a socket',
		async () => {
			const deep = join(directory, 'x'.repeat(100));
			mkdirSync(deep);
			const cluster = await startCluster({ directory: deep });
			expect(await ask(cluster.url, 'select 1 one')).toEqual([{ one: 1 }]);
			const sockets = readFileSync(join(deep, 'cluster-sockets'), 'utf8');
			await cluster.stop();
			expect(existsSync(sockets)).toBe(false);
		},
		PATIENCE_MS
	);
});

describe('a throw-away cluster', () => {
	it(
		'leaves nothing behind',
		async () => {
			const cluster: Cluster = await startCluster({ directory, throwaway: true });
			const [row] = await ask(
				cluster.url,
				`select current_setting('fsync') fsync, usesuper from pg_user where usename = current_user`
			);
			expect(row).toEqual({ fsync: 'off', usesuper: true });
			await cluster.stop();
			await cluster.stop();
			expect(await stopped(cluster)).toBe(true);
			expect(readdirSync(directory)).toEqual([]);
		},
		PATIENCE_MS
	);
});
