import { run, LaunchError } from './command.mjs';
import { root, state } from './place.mjs';
import { startCluster } from './postgres.mjs';

/**
 * @typedef {object} Database
 * @property {string} url what the application signs in with
 * @property {() => Promise<void>} stop
 */

/**
 * The database of the application: a server that is there already when the environment names one, else a cluster of
 * this checkout's own. Migrated and with the library loaded.
 *
 * @returns {Promise<Database>}
 */
export async function openDatabase() {
	const given = process.env.HAIRSBREADTH_DATABASE_URL;
	if (given) {
		await prepareDatabase(process.env.HAIRSBREADTH_DATABASE_OWNER_URL ?? given);
		return { url: given, stop: async () => undefined };
	}
	const cluster = await startCluster({ directory: state });
	try {
		await prepareDatabase(cluster.ownerUrl);
	} catch (error) {
		await cluster.stop();
		throw error;
	}
	return cluster;
}

/**
 * Migrates and loads the library; does nothing that is done already.
 *
 * @param {string} ownerUrl
 */
export async function prepareDatabase(ownerUrl) {
	const { code, output } = await run(process.execPath, ['--import', 'tsx', 'src/lib/server/db/prepare.ts'], {
		cwd: root,
		env: { ...process.env, HAIRSBREADTH_DATABASE_URL: ownerUrl }
	});
	if (code !== 0) throw new LaunchError(`Preparing the database failed:\n${output.trim()}`);
}
