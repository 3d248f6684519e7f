/** `npm start`: from a fresh clone to a page that answers, and back when Ctrl-C is pressed. */
import { relative } from 'node:path';
import { chooseAddress } from './address.mjs';
import { ensureBuild } from './build.mjs';
import { openDatabase } from './database.mjs';
import { ensurePackages } from './packages.mjs';
import { stateFile } from './place.mjs';
import { startServer, unexpected } from './server.mjs';
import { runStack } from './stack.mjs';
import { BUILT_WORKER, keepWorkers, workersWanted } from './workers.mjs';

await runStack(async ({ onStop, asked }) => {
	const { host, port, origin } = await chooseAddress();
	await ensurePackages();
	const build = await ensureBuild();
	onStop(build.release);

	console.log('Starting the database ...');
	const database = await openDatabase();
	onStop(database.stop);

	const logFile = stateFile('server.log');
	const server = await startServer({
		args: ['build/index.js'],
		env: {
			BODY_SIZE_LIMIT: '6M',
			SHUTDOWN_TIMEOUT: '5',
			HAIRSBREADTH_LOG_FILE: logFile,
			// Trying it out needs no accounts; HAIRSBREADTH_DEMO=0 turns this off.
			HAIRSBREADTH_DEMO: '1',
			...process.env,
			NODE_ENV: 'production',
			HOST: host,
			PORT: String(port),
			ORIGIN: origin,
			HAIRSBREADTH_DATABASE_URL: database.url
		},
		healthUrl: `http://${reachable(host)}:${port}/api/v1/health`
	});
	onStop(server.stop);
	const workers = await keepWorkers({
		count: workersWanted(process.env),
		args: BUILT_WORKER,
		env: {
			HAIRSBREADTH_LOG_FILE: stateFile('worker.log'),
			...process.env,
			NODE_ENV: 'production',
			HAIRSBREADTH_DATABASE_URL: database.url
		}
	});
	onStop(workers.stop);

	console.log(
		`Log: ${relative(process.cwd(), logFile) || logFile}. Ctrl-C stops everything that was started.`
	);
	console.log(`\nHairsbreadth is at ${origin}\n`);
	await Promise.race([asked, server.ended.then(unexpected)]);
});

/**
 * An address to knock at for a server that listens at `host`.
 *
 * @param {string} host
 */
function reachable(host) {
	if (host === '0.0.0.0') return '127.0.0.1';
	return host.includes(':') ? `[${host === '::' ? '::1' : host}]` : host;
}
