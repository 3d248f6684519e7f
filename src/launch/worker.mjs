/**
 * `npm run worker`: workers alone, for screenings of an installation whose server runs elsewhere or here. Runs as often as wanted,
 * on as many machines as reach the database that HAIRSBREADTH_DATABASE_URL names; without it, the database of this folder.
 */
import { ensureBuild } from './build.mjs';
import { openDatabase } from './database.mjs';
import { ensurePackages } from './packages.mjs';
import { runStack } from './stack.mjs';
import { BUILT_WORKER, keepWorkers, workersWanted } from './workers.mjs';

await runStack(async ({ onStop, asked }) => {
	await ensurePackages();
	const build = await ensureBuild();
	onStop(build.release);
	const database = await openDatabase();
	onStop(database.stop);
	const count = Math.max(1, workersWanted(process.env));
	const workers = await keepWorkers({
		count,
		args: BUILT_WORKER,
		env: { ...process.env, NODE_ENV: 'production', HAIRSBREADTH_DATABASE_URL: database.url }
	});
	onStop(workers.stop);
	console.log(`${count === 1 ? 'One worker takes' : `${count} workers take`} screenings. Ctrl-C stops.`);
	await asked;
});
