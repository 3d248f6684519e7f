import { ensureBuild } from '../../src/launch/build.mjs';
import { BUILT_WORKER, startWorker } from '../../src/launch/workers.mjs';

/** Real worker processes of the built application, which tests start, end and kill. */

export interface TestWorker {
	pid: number;
	stop: () => Promise<void>;
	/** As a machine that loses its power. */
	kill: () => void;
}

export async function openWorkers(
	databaseUrl: string
): Promise<{ start: () => Promise<TestWorker>; close: () => Promise<void> }> {
	const { release } = await ensureBuild();
	const started: { stop: () => Promise<void> }[] = [];
	return {
		start: async () => {
			const worker = await startWorker({
				args: BUILT_WORKER,
				env: {
					...process.env,
					NODE_ENV: 'production',
					HAIRSBREADTH_DATABASE_URL: databaseUrl,
					HAIRSBREADTH_LOG_LEVEL: 'silent'
				}
			});
			started.push(worker);
			return { ...worker, kill: () => process.kill(worker.pid, 'SIGKILL') };
		},
		close: async () => {
			await Promise.all(started.map((worker) => worker.stop()));
			release();
		}
	};
}
