import { createHash } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { LaunchError, mustRun, run } from './command.mjs';
import { isRoot } from './debian.mjs';

/** The account that Debian's package makes; the server refuses to run as root. */
const SERVER_ACCOUNT = 'postgres';
const ELSEWHERE = '/var/lib/hairsbreadth';

/** Variables of the caller (PGDATA, PGHOST, ...) must not steer a cluster of our own. */
const serverEnvironment = {
	PATH: `${process.env.PATH ?? ''}:/usr/bin:/bin:/usr/sbin:/sbin`,
	LANG: 'C.UTF-8',
	LC_ALL: 'C.UTF-8',
	TZ: 'UTC'
};

/**
 * Command and arguments as the account that runs the server.
 *
 * @param {string} command
 * @param {string[]} args
 * @returns {{ command: string, args: string[], env: Record<string, string> }}
 */
export function asServerAccount(command, args) {
	return isRoot()
		? { command: 'runuser', args: ['-u', SERVER_ACCOUNT, '--', command, ...args], env: serverEnvironment }
		: { command, args, env: serverEnvironment };
}

/**
 * @param {string} command
 * @param {string[]} args
 * @param {string} [input]
 */
export function runAsServer(command, args, input) {
	const call = asServerAccount(command, args);
	// The folder that the caller stands in may be closed to the other account.
	return run(call.command, call.args, { cwd: '/', env: call.env, input });
}

/**
 * @param {string} command
 * @param {string[]} args
 * @param {string} [input]
 */
export function mustRunAsServer(command, args, input) {
	const call = asServerAccount(command, args);
	return mustRun(call.command, call.args, { cwd: '/', env: call.env, input });
}

/**
 * Where the cluster stands: below `directory`, or, when the account of the server cannot enter that (a clone in root's
 * home), below /var/lib. The choice is written down in `directory`, so that the next start finds the same data.
 *
 * @param {string} directory
 * @returns {Promise<string>} a folder that exists and belongs to the account of the server
 */
export async function clusterHome(directory) {
	mkdirSync(directory, { recursive: true });
	const note = join(directory, 'cluster-home');
	if (existsSync(note)) {
		const recorded = readFileSync(note, 'utf8').trim();
		if (recorded && (await claim(recorded))) return recorded;
		throw new LaunchError(
			`${note} says that the database stands in ${recorded}, which cannot be entered. ` +
				'Put it back, or remove the file to begin with an empty database.'
		);
	}
	const near = join(resolve(directory), 'cluster');
	const far = join(ELSEWHERE, createHash('sha256').update(resolve(directory)).digest('hex').slice(0, 16));
	for (const home of isRoot() ? [near, far] : [near]) {
		mkdirSync(home, { recursive: true });
		if (await claim(home)) {
			writeFileSync(note, `${home}\n`);
			return home;
		}
	}
	throw new LaunchError(
		`The account that runs PostgreSQL can write neither below ${directory} nor below ${ELSEWHERE}.`
	);
}

/**
 * Hands a folder to the account of the server and says whether that account can work in it.
 *
 * @param {string} home
 */
async function claim(home) {
	if (!existsSync(home)) return false;
	if (!isRoot()) return true;
	const known = await run('id', ['-u', SERVER_ACCOUNT]);
	if (known.code !== 0) {
		throw new LaunchError(
			`The server cannot run as root and there is no account ${SERVER_ACCOUNT}. Make one: useradd --system ${SERVER_ACCOUNT}`
		);
	}
	await mustRun('chown', [SERVER_ACCOUNT, home]);
	chmodSync(home, 0o700);
	return (await runAsServer('test', ['-w', home])).code === 0;
}
