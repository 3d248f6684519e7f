import { LaunchError, allowCommands, interruptCommands } from './command.mjs';

const SIGNALS = /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP']);

/**
 * @typedef {object} Stack
 * @property {(stop: () => unknown) => void} onStop adds what must be stopped; the last added is stopped first
 * @property {Promise<void>} asked fulfilled by Ctrl-C or a signal
 * @property {() => boolean} interrupted whether it was
 * @property {(say: () => void) => void} atEnd adds what is said after everything has stopped
 */

/**
 * Runs `work`, and afterwards stops everything it started, in the reverse order: at its end, on an error, on Ctrl-C.
 *
 * @param {(stack: Stack) => Promise<void>} work
 * @param {number} [interruptedCode] of this process when it was told to stop; a server that was is a success
 */
export async function runStack(work, interruptedCode = 0) {
	/** @type {(() => unknown)[]} */
	const stops = [];
	/** @type {(() => void)[]} */
	const lastWords = [];
	let wanted = false;
	let ask = () => {};
	/** @type {Promise<void>} */
	const asked = new Promise((resolve) => (ask = resolve));
	const onSignal = () => {
		wanted = true;
		interruptCommands();
		ask();
	};
	// Kept until the end: a second Ctrl-C must not interrupt the orderly stop.
	for (const signal of SIGNALS) process.on(signal, onSignal);
	watchParent(onSignal);
	try {
		await work({
			onStop: (stop) => stops.push(stop),
			asked,
			interrupted: () => wanted,
			atEnd: (say) => lastWords.push(say)
		});
	} catch (error) {
		// What fails because it was interrupted is no news.
		if (!wanted) {
			console.error(error instanceof LaunchError ? `\n${error.message}\n` : error);
			process.exitCode = 1;
		}
	}
	allowCommands();
	for (const stop of stops.reverse()) {
		try {
			await stop();
		} catch (error) {
			console.error(error);
			process.exitCode = 1;
		}
	}
	for (const say of lastWords) say();
	if (wanted) process.exitCode = interruptedCode;
	// Without an argument: even an undefined one would wipe out the code that was set.
	process.exit();
}

/**
 * A signal sent to npm ends npm and the shell below it, and does not reach this process: it only sees its parent change.
 *
 * @param {() => void} onGone
 */
function watchParent(onGone) {
	if (!process.env.npm_lifecycle_event) return;
	const parent = process.ppid;
	const watch = setInterval(() => {
		if (process.ppid === parent) return;
		clearInterval(watch);
		onGone();
	}, 500);
	watch.unref();
}
