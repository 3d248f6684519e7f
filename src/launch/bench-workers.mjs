import { cpus } from 'node:os';
import { setTimeout as sleep } from 'node:timers/promises';
import postgres from 'postgres';
import { ensureBuild } from './build.mjs';
import { run } from './command.mjs';
import { prepareDatabase } from './database.mjs';
import { root } from './place.mjs';
import { startCluster } from './postgres.mjs';
import { runStack } from './stack.mjs';
import { BUILT_WORKER, startWorker } from './workers.mjs';

/**
 * `npm run bench -- --workers`: 40 solids x 40 solids x 10 liquids at 5 separations on a throw-away database, by one worker, by two, and
 * by two of which one is killed ten times while PostgreSQL is killed twice; prints times, and whether the bits are the same.
 */
export async function benchWorkers() {
	await runStack(async ({ onStop }) => {
		const build = await ensureBuild();
		onStop(build.release);
		const cluster = await startCluster({ throwaway: true });
		onStop(cluster.stop);
		await prepareDatabase(cluster.ownerUrl);
		const env = {
			...process.env,
			NODE_ENV: 'production',
			HAIRSBREADTH_DATABASE_URL: cluster.url,
			HAIRSBREADTH_LOG_LEVEL: 'silent'
		};
		const sql = postgres(cluster.url, { max: 1, onnotice: () => undefined });
		onStop(() => sql.end({ timeout: 2 }));
		console.log(`${cpus()[0].model}, ${cpus().length} cores, node ${process.version}`);

		const state = async () => {
			for (;;) {
				try {
					const [row] = await sql`select state, cells, cells_done, checksum, computed_seconds from screening
						order by created_at desc limit 1`;
					return row;
				} catch {
					await sleep(200);
				}
			}
		};
		const create = async () => {
			const { code, output } = await run(
				process.execPath,
				['--import', 'tsx', 'tests/bench/state-screening.ts'],
				{
					cwd: root,
					env
				}
			);
			if (code !== 0) throw new Error(output);
		};
		const finished = async () => {
			for (;;) {
				const row = await state();
				if (row.state === 'finished') return row;
				if (row.state === 'failed') throw new Error('the screening failed');
				await sleep(50);
			}
		};

		const checksums = new Set();
		for (const count of [1, 2]) {
			const workers = await Promise.all(
				Array.from({ length: count }, () => startWorker({ args: BUILT_WORKER, env }))
			);
			await create();
			const began = performance.now();
			const { cells, checksum, computed_seconds: computed } = await finished();
			const seconds = (performance.now() - began) / 1000;
			checksums.add(checksum);
			console.log(
				`${count} worker${count > 1 ? 's' : ''}: ${cells} cells in ${seconds.toFixed(1)} s, ${(cells / seconds).toFixed(0)} cells/s, ${(cells / seconds / count).toFixed(0)} a worker; ${computed.toFixed(1)} s of computing`
			);
			await Promise.all(workers.map((worker) => worker.stop()));
		}

		let workers = [
			await startWorker({ args: BUILT_WORKER, env }),
			await startWorker({ args: BUILT_WORKER, env })
		];
		await create();
		const began = performance.now();
		let crashes = 0;
		for (let kill = 0; kill < 10; kill += 1) {
			await sleep(150);
			process.kill(workers[0].pid, 'SIGKILL');
			workers = [workers[1], await startWorker({ args: BUILT_WORKER, env })];
			if (kill === 3 || kill === 7) crashes += await crash(sql);
		}
		const row = await finished();
		checksums.add(row.checksum);
		console.log(
			`2 workers, ten kills of a worker and ${crashes} of PostgreSQL: ${row.cells_done} of ${row.cells} cells in ${((performance.now() - began) / 1000).toFixed(1)} s`
		);
		console.log(
			checksums.size === 1
				? `same bits: ${[...checksums][0]}`
				: `DIFFERENT BITS: ${[...checksums].join(', ')}`
		);
		if (checksums.size !== 1) process.exitCode = 1;
		await Promise.all(workers.map((worker) => worker.stop()));

		const { code, output } = await run(
			process.execPath,
			['--import', 'tsx', 'tests/bench/queue-contention.ts'],
			{
				cwd: root,
				env
			}
		);
		console.log(`\nThe queue alone, with nothing to compute:\n${output.trim()}`);
		if (code !== 0) process.exitCode = 1;
	});
}

/**
 * Kills a process of the server that serves a worker: PostgreSQL then drops every connection and recovers from its log.
 *
 * @param {import('postgres').Sql} sql
 */
async function crash(sql) {
	const [other] =
		await sql`select pid from pg_stat_activity where datname = current_database() and pid <> pg_backend_pid() limit 1`;
	if (!other) return 0;
	process.kill(other.pid, 'SIGKILL');
	return 1;
}
