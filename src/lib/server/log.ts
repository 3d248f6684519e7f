import pino, { type Logger } from 'pino';
import { config } from './config.ts';

/**
 * One line of JSON an event, to the standard output or to a file. With a file, warnings are shown at the terminal too:
 * the person who started the application should not have to look for them.
 */

let shared: Logger | undefined;

export function log(): Logger {
	shared ??= open();
	return shared;
}

function open(): Logger {
	const { logFile, logLevel = process.env.NODE_ENV === 'production' ? 'info' : 'warn' } = config();
	const options = { level: logLevel, base: undefined, timestamp: pino.stdTimeFunctions.isoTime };
	if (!logFile || logLevel === 'silent') return pino(options);
	const file = pino.destination({ dest: logFile, append: true, mkdir: true, sync: true });
	return pino(
		options,
		pino.multistream([
			{ level: logLevel, stream: file },
			{ level: 'warn', stream: process.stderr }
		])
	);
}
