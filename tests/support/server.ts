import type postgres from 'postgres';
import { ensureBuild } from '../../src/launch/build.mjs';
import { freePort } from '../../src/launch/free-port.mjs';
import { startServer } from '../../src/launch/server.mjs';
import { freshDatabase } from './database.ts';

export interface TestServer {
	/** As `http://localhost:5999`. */
	origin: string;
	/** Into its database, as superuser. */
	sql: postgres.Sql;
	/** Ends the process and starts another one on the same database and address. */
	restart: () => Promise<void>;
	stop: () => Promise<void>;
}

/**
 * The built application in a process of its own, on a database of its own that holds the seed. What only the real
 * thing shows (headers, limits, a caller that hangs up) is tested against this.
 */
export async function startTestServer(environment: Record<string, string> = {}): Promise<TestServer> {
	const stops: (() => unknown)[] = [];
	const stop = async () => {
		for (const one of stops.reverse()) await one();
	};
	try {
		const { release } = await ensureBuild();
		stops.push(release);
		const { applicationUrl: databaseUrl, sql, drop } = await freshDatabase();
		stops.push(drop);
		// A cluster of ours gives its application role this by default; a copied template has no such defaults.
		await sql`grant select, insert, update, delete on rate_counter to hairsbreadth_app`;
		const port = await freePort();
		const origin = `http://localhost:${port}`;
		const options = {
			args: ['build/index.js'],
			env: {
				...process.env,
				NODE_ENV: 'production',
				HOST: '127.0.0.1',
				PORT: String(port),
				ORIGIN: origin,
				BODY_SIZE_LIMIT: '6M',
				SHUTDOWN_TIMEOUT: '1',
				HAIRSBREADTH_DATABASE_URL: databaseUrl,
				HAIRSBREADTH_DURABILITY: 'throwaway',
				HAIRSBREADTH_LOG_LEVEL: 'silent',
				HAIRSBREADTH_DEMO: '1',
				HAIRSBREADTH_COMPUTE_SECONDS: '1000000',
				...environment
			},
			healthUrl: `${origin}/api/v1/health`
		};
		let server = await startServer(options);
		stops.push(() => server.stop());
		const restart = async () => {
			await server.stop();
			server = await startServer(options);
		};
		return { origin, sql, restart, stop };
	} catch (error) {
		await stop();
		throw error;
	}
}
