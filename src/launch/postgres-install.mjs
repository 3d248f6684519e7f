import { existsSync, mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { LaunchError, run } from './command.mjs';
import { aptInstall, isRoot } from './debian.mjs';

/** The oldest server that the migrations are tried on. */
export const OLDEST_MAJOR = 15;

const DEBIAN_FOLDER = '/usr/lib/postgresql';

/**
 * @typedef {object} Binaries
 * @property {number} major
 * @property {string} folder holds initdb, pg_ctl, postgres and psql
 */

/**
 * Servers on this machine, newest first. A folder with the client alone does not count.
 *
 * @returns {Promise<Binaries[]>}
 */
async function installed() {
	const folders = existsSync(DEBIAN_FOLDER)
		? readdirSync(DEBIAN_FOLDER).map((version) => join(DEBIAN_FOLDER, version, 'bin'))
		: [];
	const onPath = await run('pg_config', ['--bindir']);
	if (onPath.code === 0) folders.push(onPath.stdout.trim());

	/** @type {Binaries[]} */
	const found = [];
	for (const folder of new Set(folders)) {
		if (!['initdb', 'pg_ctl', 'postgres', 'psql'].every((name) => existsSync(join(folder, name)))) continue;
		const version = await run(join(folder, 'postgres'), ['--version']);
		const major = Number(/(\d+)/.exec(version.stdout)?.[1]);
		if (version.code === 0 && major >= OLDEST_MAJOR) found.push({ major, folder });
	}
	return found.sort((a, b) => b.major - a.major);
}

/**
 * Finds PostgreSQL, installing Debian's package where this account may.
 *
 * @param {number} [major] the one that an existing data directory asks for; without it the newest
 * @returns {Promise<Binaries>}
 */
export async function findPostgres(major) {
	const wanted = (/** @type {Binaries[]} */ list) => list.find((entry) => !major || entry.major === major);
	const present = wanted(await installed());
	if (present) return present;

	const packageName = major ? `postgresql-${major}` : 'postgresql';
	const reason = major
		? `The data were written by PostgreSQL ${major}, which is not installed any more.`
		: `PostgreSQL ${OLDEST_MAJOR} or newer is needed and was not found.`;
	if (!isRoot()) {
		throw new LaunchError(
			`${reason} Install it, then start again:\n\n    sudo apt-get update && sudo apt-get install -y ${packageName}\n\n` +
				'or set HAIRSBREADTH_DATABASE_URL to a server that is there already.'
		);
	}
	console.log(`${reason} Installing Debian's package ${packageName} ...`);
	await withoutMainCluster(() => aptInstall(packageName));
	const found = wanted(await installed());
	if (!found)
		throw new LaunchError(
			`${packageName} was installed, but no server of version ${OLDEST_MAJOR} or newer came with it.`
		);
	return found;
}

/**
 * Debian's package makes and starts a cluster of its own. This application has no use for it, so the package is told
 * not to for as long as it installs.
 *
 * @param {() => Promise<void>} install
 */
async function withoutMainCluster(install) {
	const folder = '/etc/postgresql-common/createcluster.d';
	const file = join(folder, 'hairsbreadth-install.conf');
	mkdirSync(folder, { recursive: true });
	writeFileSync(file, 'create_main_cluster = false\n');
	try {
		await install();
	} finally {
		rmSync(file, { force: true });
	}
}
