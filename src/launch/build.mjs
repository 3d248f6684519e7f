import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { LaunchError, run } from './command.mjs';
import { leases, withLock } from './lease.mjs';
import { npm } from './packages.mjs';
import { root, stateFile } from './place.mjs';

const FOLDERS = ['src', 'static'];
const FILES = [
	'package-lock.json',
	'svelte.config.js',
	'tailwind.config.ts',
	'tsconfig.json',
	'vite.config.ts',
	'vite.threads.config.ts'
];
const PRODUCTS = ['build/index.js', 'build/threads/engine-task.js', 'build/threads/worker.js'];

/** What does not end up in the build need not make it stale. */
const LEFT_OUT = /\.test\.ts$|^src\/launch\//;

/** One number for the content of all sources: times change with every checkout, content does not. */
function sourcesHash() {
	const hash = createHash('sha256');
	const inFolders = FOLDERS.flatMap((folder) =>
		readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
			.filter((entry) => entry.isFile())
			.map((entry) => relative(root, join(entry.parentPath, entry.name)))
	);
	for (const file of [...inFolders, ...FILES].filter((name) => !LEFT_OUT.test(name)).sort()) {
		hash
			.update(`${file}\0`)
			.update(readFileSync(join(root, file)))
			.update('\0');
	}
	return hash.digest('hex');
}

/**
 * Builds the application when its sources are not those of the last build, and counts this process among those that
 * use it: a server that runs must not have its files replaced, or it ends at the next request for one of them.
 *
 * @returns {Promise<{ release: () => void }>}
 */
export async function ensureBuild() {
	return withLock(stateFile('build-lock'), async () => {
		const users = leases(stateFile('build-users'));
		const stamp = stateFile('build-stamp');
		const wanted = sourcesHash();
		const fresh = PRODUCTS.every((file) => existsSync(join(root, file)));
		if (!fresh || !existsSync(stamp) || readFileSync(stamp, 'utf8') !== wanted) {
			if (users.othersLive()) {
				throw new LaunchError(
					'The sources have changed, and a server that runs uses the last build. Stop it, then start again.'
				);
			}
			console.log('Building the application (about half a minute) ...');
			const { code, output } = await run(...npm(['run', '--silent', 'build']), {
				cwd: root,
				env: { ...process.env, NODE_ENV: 'production' }
			});
			if (code !== 0) throw new LaunchError(`The build failed:\n${output.trim()}`);
			writeFileSync(stamp, wanted);
		}
		users.take();
		return { release: () => void users.release() };
	});
}
