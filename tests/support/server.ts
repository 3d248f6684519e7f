import { randomBytes } from 'node:crypto';
import postgres from 'postgres';
import { ensureBuild } from '../../src/launch/build.mjs';
import { prepareDatabase } from '../../src/launch/database.mjs';
import { freePort } from '../../src/launch/free-port.mjs';
import { startCluster } from '../../src/launch/postgres.mjs';
import { startServer } from '../../src/launch/server.mjs';

export interface TestServer {
	/** As `http://localhost:5999`. */
	origin: string;
	databaseUrl: string;
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
		const databaseUrl = await seededDatabase(stops);
		const port = await freePort();
		const origin = `http://localhost:${port}`;
		const server = await startServer({
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
				HAIRSBREADTH_COMPUTE_SECONDS: '1000000',
				...environment
			},
			healthUrl: `${origin}/api/v1/health`
		});
		stops.push(server.stop);
		return { origin, databaseUrl, stop };
	} catch (error) {
		await stop();
		throw error;
	}
}

async function seededDatabase(stops: (() => unknown)[]): Promise<string> {
	let server = process.env.HAIRSBREADTH_TEST_SERVER;
	if (!server) {
		const cluster = await startCluster({ throwaway: true });
		stops.push(cluster.stop);
		server = cluster.url;
	}
	const name = `server_${randomBytes(6).toString('hex')}`;
	const admin = postgres(server, { max: 1, onnotice: () => undefined });
	await admin.unsafe(`create database ${name}`);
	stops.push(async () => {
		await admin.unsafe(`drop database ${name} with (force)`);
		await admin.end();
	});
	const url = new URL(server);
	url.pathname = `/${name}`;
	await prepareDatabase(url.href);
	return url.href;
}
