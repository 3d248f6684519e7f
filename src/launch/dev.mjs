/** `npm run dev`: the same database, the sources served as they are edited. */
import { chooseAddress } from './address.mjs';
import { openDatabase } from './database.mjs';
import { ensurePackages } from './packages.mjs';
import { startServer, unexpected } from './server.mjs';
import { runStack } from './stack.mjs';
import { keepWorkers, SOURCE_WORKER, workersWanted } from './workers.mjs';

await runStack(async ({ onStop, asked }) => {
	const { host, port, origin } = await chooseAddress();
	await ensurePackages();
	console.log('Starting the database ...');
	const database = await openDatabase();
	onStop(database.stop);

	const server = await startServer({
		args: ['node_modules/vite/bin/vite.js', 'dev', '--host', host, '--port', String(port), '--strictPort'],
		env: {
			HAIRSBREADTH_DEMO: '1',
			...process.env,
			HOST: host,
			ORIGIN: origin,
			HAIRSBREADTH_DATABASE_URL: database.url
		},
		healthUrl: `http://${host}:${port}/api/v1/health`,
		show: true
	});
	onStop(server.stop);
	const workers = await keepWorkers({
		count: Math.min(1, workersWanted(process.env)),
		args: SOURCE_WORKER,
		env: { ...process.env, HAIRSBREADTH_DATABASE_URL: database.url }
	});
	onStop(workers.stop);
	console.log(`\nHairsbreadth (development) is at ${origin}\n`);
	await Promise.race([asked, server.ended.then(unexpected)]);
});
