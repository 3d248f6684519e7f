import { createHash } from 'node:crypto';
import { existsSync, lstatSync, readFileSync, realpathSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { LaunchError, run } from './command.mjs';
import { root, stateFile } from './place.mjs';

/**
 * Installs exactly what the lock file names, when that is not what is there.
 */
export async function ensurePackages() {
	const lock = join(root, 'package-lock.json');
	const installed = join(root, 'node_modules', '.package-lock.json');
	const stamp = stateFile('packages-stamp');
	const wanted = createHash('sha256').update(readFileSync(lock)).digest('hex');
	if (existsSync(installed)) {
		const known = existsSync(stamp) ? readFileSync(stamp, 'utf8') : '';
		// Installed by hand after the lock file was last written: nothing to do but to remember it.
		if (known === wanted || (!known && statSync(installed).mtimeMs >= statSync(lock).mtimeMs)) {
			writeFileSync(stamp, wanted);
			return;
		}
	}
	refuseLink(join(root, 'node_modules'));
	console.log('Installing packages from the lock file ...');
	const { code, output } = await run(...npm(['ci', '--include=dev', '--no-audit', '--no-fund']), {
		cwd: root
	});
	if (code !== 0) throw new LaunchError(`npm ci failed:\n${output.trim()}`);
	writeFileSync(stamp, wanted);
}

/**
 * npm empties the folder before it installs, and through a link that is somebody else's folder.
 *
 * @param {string} folder
 */
function refuseLink(folder) {
	if (!lstatSync(folder, { throwIfNoEntry: false })?.isSymbolicLink()) return;
	throw new LaunchError(
		`${folder} is a link to ${realpathSync(folder)}, which an install would empty. ` +
			'Remove the link, or install the packages there yourself.'
	);
}

/**
 * The npm that started this process, else the one on the path.
 *
 * @param {string[]} args
 * @returns {[string, string[]]}
 */
export function npm(args) {
	const script = process.env.npm_execpath;
	return script && existsSync(script) && /\.c?js$/.test(script)
		? [process.execPath, [script, ...args]]
		: ['npm', args];
}
