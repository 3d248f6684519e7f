import { LaunchError, run } from './command.mjs';

/** Whether this process may install packages and has to hand PostgreSQL to another account. */
export const isRoot = () => process.getuid?.() === 0;

/**
 * Installs a Debian package without asking anything.
 *
 * @param {string} name
 */
export async function aptInstall(name) {
	const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
	// A stale package list is no reason to give up: the install says what is really missing.
	await run('apt-get', ['update', '-q'], { env, show: true });
	const result = await run('apt-get', ['install', '-y', '-q', '--no-install-recommends', name], {
		env,
		show: true
	});
	if (result.code !== 0) {
		throw new LaunchError(
			`Installing ${name} failed. Try it by hand: apt-get update && apt-get install -y ${name}`
		);
	}
}
