import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** The folder of the checkout that is never committed. */
const FOLDER = '.hairsbreadth';
const FILE = 'secret';

/**
 * The secret of a demonstration or of development: made once and kept, so that a restart does not spoil what waits to be
 * sent. Production never comes here.
 */
export function demoSecret(folder = FOLDER): Buffer {
	const file = join(folder, FILE);
	if (!existsSync(file)) {
		mkdirSync(folder, { recursive: true });
		try {
			writeFileSync(file, randomBytes(32).toString('base64'), { mode: 0o600, flag: 'wx' });
		} catch (error) {
			// Another process made it in between; its secret counts.
			if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
		}
	}
	return Buffer.from(readFileSync(file, 'utf8'), 'base64');
}
