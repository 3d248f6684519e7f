/**
 * A PostgreSQL cluster that belongs to this checkout: made when missing, started, shared by the processes that need
 * it, and stopped by the last of them. Two kinds: the kept one holds people's work (checksums, fsync, passwords);
 * a throw-away one lives for one run of the tests (everything slow is off).
 */
import {
	chmodSync,
	existsSync,
	mkdtempSync,
	readFileSync,
	readlinkSync,
	rmSync,
	writeFileSync
} from 'node:fs';
import { spawnSync } from 'node:child_process';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { LaunchError, run } from './command.mjs';
import { freePort } from './free-port.mjs';
import { isAlive, leases, withLock } from './lease.mjs';
import { findPostgres } from './postgres-install.mjs';
import { asServerAccount, clusterHome, mustRunAsServer, runAsServer } from './postgres-place.mjs';
import {
	APPLICATION,
	DATABASE,
	OWNER,
	checkDurability,
	prepareRoles,
	readPasswords
} from './postgres-roles.mjs';

/**
 * @typedef {object} Cluster
 * @property {string} url for the application; for a throw-away cluster the superuser, so that tests can make databases
 * @property {string} ownerUrl for migrations and the seed
 * @property {number} port
 * @property {() => Promise<void>} stop releases it; the last user stops the server
 */

/**
 * @param {{ directory?: string, throwaway?: boolean }} [options] directory: an ignored folder of the checkout; needed
 *   for a kept cluster
 * @returns {Promise<Cluster>}
 */
export async function startCluster({ directory, throwaway = false } = {}) {
	if (!directory && !throwaway) throw new LaunchError('A kept cluster needs a directory.');
	const place = directory ?? temporaryPlace();
	const recorded = existsSync(join(place, 'cluster-home'))
		? readFileSync(join(place, 'cluster-home'), 'utf8').trim()
		: '';
	const written = join(recorded, 'data', 'PG_VERSION');
	const binaries = await findPostgres(
		recorded && existsSync(written) ? Number(readFileSync(written, 'utf8').trim()) : undefined
	);
	const home = await clusterHome(place);
	return withLock(join(place, 'cluster-lock'), () =>
		open({ place, home, data: join(home, 'data'), bin: binaries.folder, throwaway, temporary: !directory })
	);
}

function temporaryPlace() {
	const place = mkdtempSync(join(tmpdir(), 'hairsbreadth-'));
	// Others may pass through, so that the account of the server reaches its own folder below.
	chmodSync(place, 0o711);
	return place;
}

/**
 * @typedef {object} Site
 * @property {string} place the directory asked for
 * @property {string} home belongs to the account of the server
 * @property {string} data
 * @property {string} bin
 * @property {boolean} throwaway
 * @property {boolean} temporary `place` was made here and goes away with the cluster
 */

/**
 * @param {Site} site
 * @returns {Promise<Cluster>}
 */
async function open(site) {
	if (!existsSync(join(site.data, 'PG_VERSION'))) await create(site);
	const users = leases(join(site.place, 'cluster-users'));
	const running = await findRunning(site);
	const { leftBehind } = users.take();
	let port = running;
	if (!port) {
		const portFile = join(site.place, 'cluster-port');
		port = await freePort(existsSync(portFile) ? Number(readFileSync(portFile, 'utf8')) : 0);
		writeFileSync(portFile, `${port}\n`);
		await launch(site, port).catch(async (error) => {
			users.release();
			// It may be half up when the wait for it was interrupted.
			await runAsServer(join(site.bin, 'pg_ctl'), stopFlags(site));
			throw error;
		});
	}
	// A server that was up before, without a trace of a start from here, is somebody's own doing and stays up.
	const ours = !running || leftBehind || existsSync(join(site.place, 'cluster-ours'));
	if (ours) writeFileSync(join(site.place, 'cluster-ours'), '');

	let stopped = false;
	const forget = () => {
		if (stopped) return false;
		stopped = true;
		process.off('exit', atExit);
		return !users.release().othersLeft && ours;
	};
	// A run that throws or calls process.exit leaves no server behind either.
	const atExit = () => {
		if (!forget()) return;
		const halt = asServerAccount(join(site.bin, 'pg_ctl'), stopFlags(site));
		spawnSync(halt.command, halt.args, { cwd: '/', env: halt.env, stdio: 'ignore' });
		clear(site);
	};
	process.on('exit', atExit);

	const passwords = site.throwaway ? undefined : readPasswords(site.place);
	const admin = { bin: site.bin, sockets: readFileSync(join(site.place, 'cluster-sockets'), 'utf8'), port };
	await prepareRoles(admin, passwords);
	if (!site.throwaway) await checkDurability(admin);

	const address = (
		/** @type {string} */ role,
		/** @type {string | undefined} */ password,
		database = DATABASE
	) => `postgres://${role}${password ? `:${password}` : ''}@127.0.0.1:${port}/${database}`;
	return {
		url: passwords ? address(APPLICATION, passwords.application) : address('postgres', undefined),
		ownerUrl: address(OWNER, passwords?.owner),
		port,
		stop: async () => {
			if (!forget()) return;
			await mustRunAsServer(join(site.bin, 'pg_ctl'), stopFlags(site));
			clear(site);
		}
	};
}

/** @param {Site} site */
function clear(site) {
	const sockets = join(site.place, 'cluster-sockets');
	rmSync(readFileSync(sockets, 'utf8'), { recursive: true, force: true });
	rmSync(sockets, { force: true });
	rmSync(join(site.place, 'cluster-ours'), { force: true });
	if (!site.throwaway) return;
	rmSync(site.home, { recursive: true, force: true });
	for (const name of ['cluster-home', 'cluster-port', 'cluster-users']) {
		rmSync(join(site.place, name), { recursive: true, force: true });
	}
	if (site.temporary) rmSync(site.place, { recursive: true, force: true });
}

/**
 * Makes the data directory. Built under another name and renamed at the end, so that an interrupted start leaves
 * nothing that looks finished.
 *
 * @param {Site} site
 */
async function create(site) {
	const draft = join(site.home, 'data-draft');
	rmSync(draft, { recursive: true, force: true });
	const flags = ['-D', draft, '-U', 'postgres', '-E', 'UTF8', '--locale=C.UTF-8', '-A', 'trust'];
	await mustRunAsServer(join(site.bin, 'initdb'), [
		...flags,
		...(site.throwaway ? ['--no-sync'] : ['--data-checksums'])
	]);
	// Peer is by the name of the account, which for an ordinary user is not that of the role.
	const account = (await mustRunAsServer('id', ['-un'])).stdout.trim();
	const rules = site.throwaway
		? 'local all all trust\nhost all all 127.0.0.1/32 trust\n'
		: `local all postgres peer map=hairsbreadth\nhost all ${OWNER},${APPLICATION} 127.0.0.1/32 scram-sha-256\n`;
	await mustRunAsServer('tee', [join(draft, 'pg_hba.conf')], rules);
	await mustRunAsServer('tee', [join(draft, 'pg_ident.conf')], `hairsbreadth ${account} postgres\n`);
	await mustRunAsServer('mv', [draft, site.data]);
}

/**
 * @param {Site} site
 * @param {number} port
 */
async function launch(site, port) {
	await clearStalePid(site);
	const folder = await socketFolder(site);
	const settings = {
		listen_addresses: '127.0.0.1',
		port,
		unix_socket_directories: folder,
		unix_socket_permissions: '0700',
		password_encryption: 'scram-sha-256',
		fsync: site.throwaway ? 'off' : 'on',
		synchronous_commit: site.throwaway ? 'off' : 'on',
		full_page_writes: site.throwaway ? 'off' : 'on',
		timezone: 'UTC',
		log_timezone: 'UTC',
		log_destination: 'stderr',
		logging_collector: 'off'
	};
	const lines = Object.entries(settings).map(([name, value]) => `${name} = '${value}'`);
	await mustRunAsServer('tee', [join(site.data, 'postgresql.auto.conf')], `${lines.join('\n')}\n`);
	writeFileSync(join(site.place, 'cluster-sockets'), folder);

	const log = join(site.home, 'server.log');
	const flags = ['-D', site.data, '-l', log, '-w', '-t', '120', '-s', 'start'];
	const result = await runAsServer(join(site.bin, 'pg_ctl'), flags);
	if (result.code !== 0) {
		const tail = await run('tail', ['-n', '20', log]);
		throw new LaunchError(`PostgreSQL did not start:\n${result.output}${tail.output}`);
	}
}

/**
 * The path of a socket may hold about 100 bytes: a deep checkout gets a short folder among the temporary files.
 *
 * @param {Site} site
 */
async function socketFolder({ home }) {
	const near = join(home, 's');
	if (near.length >= 80)
		return (await mustRunAsServer('mktemp', ['-d', '/tmp/hairsbreadth-XXXXXXXX'])).stdout.trim();
	await mustRunAsServer('mkdir', ['-p', '-m', '0700', near]);
	return near;
}

/**
 * The port of the server that runs on our data directory, if one does.
 *
 * @param {Site} site
 * @returns {Promise<number | undefined>}
 */
async function findRunning(site) {
	const file = join(site.data, 'postmaster.pid');
	if (!existsSync(file)) return undefined;
	const lines = readFileSync(file, 'utf8').split('\n');
	return worksOn(Number(lines[0]), site.data) ? Number(lines[3]) || undefined : undefined;
}

/**
 * After a crash the pid file may name a process that is by now something else; the server would refuse to start.
 *
 * @param {Site} site
 */
async function clearStalePid(site) {
	const file = join(site.data, 'postmaster.pid');
	if (!existsSync(file)) return;
	const pid = Number(readFileSync(file, 'utf8').split('\n')[0]);
	if (!worksOn(pid, site.data)) rmSync(file, { force: true });
}

/**
 * @param {number} pid
 * @param {string} data
 */
function worksOn(pid, data) {
	if (!(pid > 0) || !isAlive(pid)) return false;
	try {
		return readlinkSync(`/proc/${pid}/cwd`) === data;
	} catch {
		return true;
	}
}

/** @param {Site} site */
function stopFlags({ data, throwaway }) {
	return ['-D', data, '-m', throwaway ? 'immediate' : 'fast', '-w', '-s', 'stop'];
}
