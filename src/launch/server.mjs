import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { setTimeout as sleep } from 'node:timers/promises';
import { LaunchError } from './command.mjs';
import { root } from './place.mjs';

const START_PATIENCE_MS = 60_000;
const STOP_PATIENCE_MS = 10_000;

/**
 * Starts a server as a child of this process and waits until it answers.
 *
 * The child is in a process group of its own, so that Ctrl-C reaches this process alone and the order of stopping is
 * ours; the channel to it tells it when this process is gone.
 *
 * @param {{ args: string[], env: NodeJS.ProcessEnv, healthUrl: string, show?: boolean }} options args: of node
 * @returns {Promise<{ ended: Promise<void>, stop: () => Promise<void> }>}
 */
export async function startServer({ args, env, healthUrl, show = false }) {
	const child = spawn(process.execPath, args, {
		cwd: root,
		env,
		detached: true,
		stdio: ['ignore', 'pipe', 'pipe', 'ipc']
	});
	let output = '';
	for (const stream of [child.stdout, child.stderr]) {
		stream?.setEncoding('utf8').on('data', (text) => {
			output = (output + text).slice(-20_000);
			if (show || stream === child.stderr) process.stderr.write(text);
		});
	}
	/** @type {Promise<void>} */
	const ended = once(child, 'exit').then(() => undefined);
	let over = false;
	void ended.then(() => (over = true));

	const stop = async () => {
		if (over) return;
		child.kill('SIGTERM');
		await Promise.race([ended, sleep(STOP_PATIENCE_MS, undefined, { ref: false })]);
		if (!over) child.kill('SIGKILL');
		await ended;
	};
	const deadline = Date.now() + START_PATIENCE_MS;
	while (!(await answers(healthUrl))) {
		if (over) throw new LaunchError(`The server ended while starting:\n${output.trim()}`);
		if (Date.now() > deadline) {
			await stop();
			throw new LaunchError(`The server did not answer at ${healthUrl}:\n${output.trim()}`);
		}
		await sleep(100);
	}
	return { ended, stop };
}

/** A server that ends while nobody asked it to. @returns {never} */
export function unexpected() {
	throw new LaunchError('The server ended by itself; its log says more.');
}

/** @param {string} url */
async function answers(url) {
	try {
		return (await fetch(url, { signal: AbortSignal.timeout(5000) })).ok;
	} catch {
		return false;
	}
}
