import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout. */
export const root = fileURLToPath(new URL('../../', import.meta.url));

/** Everything that a start leaves behind, ignored by git: the database, stamps, logs. */
export const state = join(root, '.hairsbreadth');

/** @param {string} name */
export function stateFile(name) {
	mkdirSync(state, { recursive: true });
	return join(state, name);
}
