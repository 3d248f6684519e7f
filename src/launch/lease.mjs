import { existsSync, mkdirSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { LaunchError } from './command.mjs';

/**
 * When a process began, in clock ticks since boot: with the pid it names a process for ever, while a pid alone is
 * given out again. Empty where the system does not tell.
 *
 * @param {number} pid
 */
function beginning(pid) {
	try {
		const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
		return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19];
	} catch {
		return '';
	}
}

/** @param {number} pid */
export function isAlive(pid) {
	try {
		process.kill(pid, 0);
		return true;
	} catch (error) {
		return /** @type {NodeJS.ErrnoException} */ (error).code === 'EPERM';
	}
}

const ownName = `${process.pid}-${beginning(process.pid)}`;

/** @param {string} name */
function holderLives(name) {
	const [pid, began] = name.split('-');
	return isAlive(Number(pid)) && (!began || beginning(Number(pid)) === began);
}

/**
 * Who uses a shared thing, a file for each process. The last one out stops it; files of processes that died without
 * saying so are cleared by the next.
 *
 * @param {string} directory
 */
export function leases(directory) {
	const names = () => (existsSync(directory) ? readdirSync(directory) : []);
	const othersLive = () => names().some((name) => name !== ownName && holderLives(name));
	return {
		/** Adds this process and says whether dead ones had left their mark. */
		take() {
			mkdirSync(directory, { recursive: true });
			const dead = names().filter((name) => !holderLives(name));
			for (const name of dead) rmSync(join(directory, name), { force: true });
			writeFileSync(join(directory, ownName), '');
			return { leftBehind: dead.length > 0 };
		},
		/** Takes this process away and says whether any other is left. */
		release() {
			rmSync(join(directory, ownName), { force: true });
			return { othersLeft: othersLive() };
		},
		othersLive
	};
}

/**
 * Runs `work` while holding a lock file, so that two starts at once do not build the same thing twice.
 *
 * @template T
 * @param {string} file
 * @param {() => Promise<T>} work
 * @param {number} [patienceMs]
 * @returns {Promise<T>}
 */
export async function withLock(file, work, patienceMs = 300_000) {
	const deadline = Date.now() + patienceMs;
	for (;;) {
		try {
			writeFileSync(file, ownName, { flag: 'wx' });
			break;
		} catch (error) {
			if (/** @type {NodeJS.ErrnoException} */ (error).code !== 'EEXIST') throw error;
			const holder = existsSync(file) ? readFileSync(file, 'utf8') : '';
			if (holder && !holderLives(holder)) rmSync(file, { force: true });
			else if (Date.now() > deadline) {
				throw new LaunchError(
					`Another start (${holder}) has held ${file} for too long; end it or remove the file.`
				);
			} else await sleep(100);
		}
	}
	try {
		return await work();
	} finally {
		rmSync(file, { force: true });
	}
}
