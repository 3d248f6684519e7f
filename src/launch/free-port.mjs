import { createServer } from 'node:net';

/**
 * A port that nobody listens on at `host`: the wished one when it is free, else one the system chooses.
 *
 * @param {number} [wished]
 * @param {string} [host]
 * @returns {Promise<number>}
 */
export async function freePort(wished = 0, host = '127.0.0.1') {
	if (wished > 0 && (await isFree(wished, host))) return wished;
	return new Promise((resolve, reject) => {
		const server = createServer();
		server.once('error', reject);
		server.listen(0, host, () => {
			const address = server.address();
			const port = typeof address === 'object' && address ? address.port : 0;
			server.close(() => resolve(port));
		});
	});
}

/**
 * @param {number} port
 * @param {string} [host]
 * @returns {Promise<boolean>}
 */
export function isFree(port, host = '127.0.0.1') {
	return new Promise((resolve) => {
		const server = createServer();
		server.once('error', () => resolve(false));
		server.listen(port, host, () => server.close(() => resolve(true)));
	});
}
