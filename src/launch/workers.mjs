import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { availableParallelism, setPriority } from 'node:os';
import { setTimeout as sleep } from 'node:timers/promises';
import { LaunchError } from './command.mjs';
import { root } from './place.mjs';

const START_PATIENCE_MS = 30_000;
const STOP_PATIENCE_MS = 5000;
/** Of the system's scheduler: pages go before screenings. */
const NICENESS = 10;

export const BUILT_WORKER = ['build/threads/worker.js'];
/** From source, as development runs it. */
export const SOURCE_WORKER = ['--import', 'tsx', 'src/worker/main.ts'];

/**
 * How many workers run beside the server: HAIRSBREADTH_WORKERS, else one a core, two at most.
 *
 * @param {NodeJS.ProcessEnv} environment
 */
export function workersWanted(environment) {
	const text = environment.HAIRSBREADTH_WORKERS;
	if (text === undefined || text === '') return Math.min(2, availableParallelism());
	const count = Number(text);
	if (!Number.isInteger(count) || count < 0 || count > 64)
		throw new LaunchError('HAIRSBREADTH_WORKERS must be a whole number from 0 to 64.');
	return count;
}

/**
 * Starts a worker and waits until it takes jobs.
 *
 * @param {{ args: string[], env: NodeJS.ProcessEnv }} options args: of node
 * @returns {Promise<{ pid: number, ended: Promise<void>, stop: () => Promise<void> }>}
 */
export async function startWorker({ args, env }) {
	const child = spawn(process.execPath, args, {
		cwd: root,
		env,
		detached: true,
		stdio: ['ignore', 'ignore', 'pipe', 'ipc']
	});
	let output = '';
	child.stderr?.setEncoding('utf8').on('data', (text) => (output = (output + text).slice(-20_000)));
	/** @type {Promise<void>} */
	const ended = once(child, 'exit').then(() => undefined);
	let over = false;
	void ended.then(() => (over = true));
	const ready = await Promise.race([
		once(child, 'message').then(() => true),
		ended.then(() => false),
		sleep(START_PATIENCE_MS, false, { ref: false })
	]);
	if (!ready || child.pid === undefined) {
		child.kill('SIGKILL');
		throw new LaunchError(`The worker did not start:\n${output.trim()}`);
	}
	try {
		setPriority(child.pid, NICENESS);
	} catch {
		// Where the system does not allow it, the worker runs like everything else.
	}
	return {
		pid: child.pid,
		ended,
		stop: async () => {
			if (over) return;
			child.kill('SIGTERM');
			await Promise.race([ended, sleep(STOP_PATIENCE_MS, undefined, { ref: false })]);
			if (!over) child.kill('SIGKILL');
			await ended;
		}
	};
}

/**
 * Keeps a number of workers running: one that ends by itself has a successor.
 *
 * @param {{ count: number, args: string[], env: NodeJS.ProcessEnv }} options
 * @returns {Promise<{ stop: () => Promise<void> }>}
 */
export async function keepWorkers({ count, args, env }) {
	let stopping = false;
	/** @type {Set<{ stop: () => Promise<void> }>} */
	const running = new Set();
	const startOne = async () => {
		const worker = await startWorker({ args, env });
		running.add(worker);
		void worker.ended.then(async () => {
			running.delete(worker);
			while (!stopping) {
				await sleep(1000, undefined, { ref: false });
				if (stopping) return;
				try {
					return await startOne();
				} catch (error) {
					console.error(error instanceof LaunchError ? error.message : error);
				}
			}
		});
	};
	for (let index = 0; index < count; index += 1) await startOne();
	return {
		stop: async () => {
			stopping = true;
			await Promise.all([...running].map((worker) => worker.stop()));
		}
	};
}
