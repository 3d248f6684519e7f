import { state } from './place.mjs';
import { startCluster } from './postgres.mjs';

/**
 * The database as its owner sees it, for what the application itself may not do: the cluster of this checkout, or the
 * server that the environment names.
 *
 * @returns {Promise<{ url: string, stop: () => Promise<void> }>}
 */
export async function ownerDatabase() {
	const given = process.env.HAIRSBREADTH_DATABASE_OWNER_URL ?? process.env.HAIRSBREADTH_DATABASE_URL;
	if (given) return { url: given, stop: async () => undefined };
	const { ownerUrl, stop } = await startCluster({ directory: state });
	return { url: ownerUrl, stop };
}

/**
 * How a program of PostgreSQL is told where to go: the password by the environment, since anybody on the machine can read
 * the arguments of a process.
 *
 * @param {string} url
 * @returns {{ dbname: string, env: NodeJS.ProcessEnv }}
 */
export function forProgram(url) {
	const address = new URL(url);
	const password = decodeURIComponent(address.password);
	address.password = '';
	return { dbname: address.href, env: { ...process.env, ...(password ? { PGPASSWORD: password } : {}) } };
}
