import { spawn } from 'node:child_process';

/** @type {Set<import('node:child_process').ChildProcess>} */
const running = new Set();
let interrupted = false;

/** Ends the commands that run and starts no more: somebody wants to stop. */
export function interruptCommands() {
	interrupted = true;
	for (const child of running) child.kill('SIGTERM');
}

/** Stopping in good order needs commands of its own. */
export function allowCommands() {
	interrupted = false;
}

/**
 * @typedef {object} Finished
 * @property {number} code exit code; 127 when the command does not exist
 * @property {string} output what it wrote, both streams in the order of arrival
 * @property {string} stdout
 */

/**
 * Runs a command to its end and collects what it writes. Never rejects: a command that is not there counts as 127.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, input?: string, show?: boolean }} [options] show: to the terminal as well
 * @returns {Promise<Finished>}
 */
export function run(command, args, { cwd, env = process.env, input, show = false } = {}) {
	return new Promise((resolve) => {
		if (interrupted) return resolve({ code: 130, output: 'interrupted', stdout: '' });
		const child = spawn(command, args, { cwd, env, stdio: ['pipe', 'pipe', 'pipe'] });
		running.add(child);
		let output = '';
		let stdout = '';
		child.stdout.setEncoding('utf8').on('data', (text) => {
			output += text;
			stdout += text;
			if (show) process.stdout.write(text);
		});
		child.stderr.setEncoding('utf8').on('data', (text) => {
			output += text;
			if (show) process.stderr.write(text);
		});
		// A command that ends before it has read its input must not take this process along.
		child.stdin.on('error', () => {});
		child.stdin.end(input ?? '');
		const finish = (/** @type {Finished} */ result) => {
			running.delete(child);
			resolve(result);
		};
		child.on('error', (error) => finish({ code: 127, output: String(error), stdout: '' }));
		child.on('close', (code, signal) => finish({ code: code ?? (signal ? 1 : 0), output, stdout }));
	});
}

/**
 * As `run`, but a failure throws with what the command said.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {Parameters<typeof run>[2]} [options]
 */
export async function mustRun(command, args, options) {
	const result = await run(command, args, options);
	if (result.code !== 0) {
		throw new LaunchError(`${command} ${args.join(' ')} failed (${result.code}):\n${result.output.trim()}`);
	}
	return result;
}

/** Something the person at the terminal has to know or do; shown without a stack. */
export class LaunchError extends Error {
	/** @override */
	name = 'LaunchError';
}
