import PgBoss from 'pg-boss';
import postgres from 'postgres';
import { config } from '../config.ts';
import type { Transaction } from '../db/client.ts';

/**
 * Work that waits in PostgreSQL for a worker process. The queue carries names of chunks and nothing else: progress and
 * results stand in our own tables, so that a job that runs twice does no harm.
 */

export const QUEUE_SCHEMA = 'pgboss';

/** Chunks of screenings. A worker that dies leaves its job active; after this it goes to another one. */
export const CHUNKS = {
	name: 'screening-chunk',
	expireInSeconds: 9,
	retryLimit: 1000,
	retryDelay: 0
} as const;

/** How often a worker looks for jobs whose worker has died. */
export const SWEEP_MS = 3000;

type Executor = PgBoss.Db;

/** pg-boss gives undefined and objects as they are; the driver wants null and JSON. */
const given = (value: unknown): unknown =>
	value === undefined
		? null
		: typeof value === 'object' && value !== null && !Array.isArray(value) && !(value instanceof Date)
			? JSON.stringify(value)
			: value;

function executorOf(client: Pick<postgres.Sql, 'unsafe'>): Executor {
	return {
		executeSql: async (text, values = []) => ({
			rows: [...(await client.unsafe(text, values.map(given) as postgres.ParameterOrJSON<never>[]))]
		})
	};
}

/** The client beneath a transaction of drizzle: jobs are there when, and only when, what they are about is. */
function clientOf(tx: Transaction): Pick<postgres.Sql, 'unsafe'> {
	const { session } = tx as unknown as { session: { client: postgres.Sql } };
	return session.client;
}

/** Makes the queue's own tables; run by the owner of the tables before the application starts. */
export async function prepareQueue(ownerUrl: string): Promise<void> {
	const client = postgres(ownerUrl, { max: 1, onnotice: () => undefined });
	try {
		const boss = new PgBoss({
			db: executorOf(client),
			schema: QUEUE_SCHEMA,
			supervise: false,
			schedule: false
		});
		boss.on('error', () => undefined);
		await boss.start();
		if (!(await boss.getQueue(CHUNKS.name))) await boss.createQueue(CHUNKS.name, { ...CHUNKS });
		await boss.stop({ graceful: false, wait: false });
		await client.unsafe(`do $$ begin
			if exists (select from pg_roles where rolname = 'hairsbreadth_app') then
				grant usage on schema ${QUEUE_SCHEMA} to hairsbreadth_app;
				grant select, insert, update, delete on all tables in schema ${QUEUE_SCHEMA} to hairsbreadth_app;
				grant execute on all functions in schema ${QUEUE_SCHEMA} to hairsbreadth_app;
			end if;
		end $$`);
	} finally {
		await client.end({ timeout: 5 });
	}
}

export interface ChunkJob {
	screening: string;
	position: number;
}

/** How many jobs go to the database in one statement. */
const BATCH = 1000;

/**
 * Puts chunks into the queue, in the caller's transaction.
 *
 * @param ahead  chunks of the same person that wait already. A job's priority is its place in its owner's own queue, so that
 *   the first chunks of everybody come before the hundredth of anybody.
 */
export async function enqueueChunks(
	tx: Transaction,
	jobs: readonly ChunkJob[],
	ahead: number
): Promise<void> {
	const db = executorOf(clientOf(tx));
	const boss = silent(db);
	for (let start = 0; start < jobs.length; start += BATCH) {
		await boss.insert(
			jobs.slice(start, start + BATCH).map((data, index) => ({
				name: CHUNKS.name,
				data,
				priority: -(ahead + start + index),
				expireInSeconds: CHUNKS.expireInSeconds,
				retryLimit: CHUNKS.retryLimit,
				retryDelay: CHUNKS.retryDelay
			})),
			{ db }
		);
	}
}

/** The sender's side needs no start: it only writes rows. */
function silent(db: Executor): PgBoss {
	const boss = new PgBoss({ db, schema: QUEUE_SCHEMA, supervise: false, schedule: false, migrate: false });
	boss.on('error', () => undefined);
	return boss;
}

export interface WaitingJob {
	id: string;
	data: ChunkJob;
}

/** The worker's side: takes jobs, ends them, and gives back those whose worker has died. */
export interface Taker {
	take(): Promise<WaitingJob | null>;
	done(id: string): Promise<void>;
	sweep(): Promise<void>;
	close(): Promise<void>;
}

export async function openTaker(): Promise<Taker> {
	// The queue sends whole transactions as one text, which must not be spread over connections.
	const client = postgres(config().databaseUrl, { max: 1, onnotice: () => undefined });
	const boss = silent(executorOf(client));
	await boss.start();
	return {
		async take() {
			const [job] = await boss.fetch<ChunkJob>(CHUNKS.name, { batchSize: 1 });
			return job ? { id: job.id, data: job.data } : null;
		},
		done: (id) => boss.complete(CHUNKS.name, id),
		sweep: () => boss.maintain(),
		close: async () => {
			await boss.stop({ graceful: false, wait: false });
			await client.end({ timeout: 2 });
		}
	};
}
