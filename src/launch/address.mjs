import { LaunchError } from './command.mjs';
import { freePort, isFree } from './free-port.mjs';

const USUAL_PORT = 4173;

/**
 * Where to listen and what people type. A port that was asked for is taken or refused, never changed.
 *
 * @returns {Promise<{ host: string, port: number, origin: string }>}
 */
export async function chooseAddress() {
	const host = process.env.HOST || '127.0.0.1';
	const asked = process.env.PORT;
	const port = asked ? Number(asked) : await nextFree(USUAL_PORT, host);
	if (!Number.isInteger(port) || port < 1 || port > 65_535) {
		throw new LaunchError(`PORT=${asked} is not a port: choose a number from 1 to 65535.`);
	}
	if (asked && !(await isFree(port, host))) {
		throw new LaunchError(`Port ${port} on ${host} is in use. Choose another: PORT=${port + 1} npm start`);
	}
	return { host, port, origin: process.env.ORIGIN || `http://localhost:${port}` };
}

/**
 * @param {number} first
 * @param {string} host
 */
async function nextFree(first, host) {
	for (let port = first; port < first + 20; port += 1) {
		if (await isFree(port, host)) return port;
		if (port === first) console.log(`Port ${first} is in use; taking the next free one.`);
	}
	return freePort(0, host);
}
