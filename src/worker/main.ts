import { setTimeout as sleep } from 'node:timers/promises';
import { closeDatabase } from '../lib/server/db/client.ts';
import { openTaker, SWEEP_MS, type Taker, type WaitingJob } from '../lib/server/jobs/queue.ts';
import { log } from '../lib/server/log.ts';
import { fail, runChunk } from '../lib/server/screening/chunks.ts';

/** A worker: takes chunks of screenings from the queue until it is told to end. Any number may run, on any machine. */

const IDLE_MS = 250;
/** After an error of the database: it may be restarting. */
const TROUBLE_MS = 500;
/** A chunk that fails this often is not unlucky. */
const FAILURES_MOST = 5;

const ending = new AbortController();
for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => ending.abort());
process.on('disconnect', () => ending.abort());

const failures = new Map<string, number>();

async function serve(taker: Taker): Promise<void> {
	let sweepAt = 0;
	while (!ending.signal.aborted) {
		if (Date.now() > sweepAt) {
			await taker.sweep();
			sweepAt = Date.now() + SWEEP_MS;
		}
		const job = await taker.take();
		if (job) await work(taker, job);
		else await sleep(IDLE_MS, undefined, { signal: ending.signal }).catch(() => undefined);
	}
}

async function work(taker: Taker, { id, data }: WaitingJob): Promise<void> {
	const key = `${data.screening}/${data.position}`;
	try {
		const became = await runChunk(data, ending.signal);
		// A worker that ends leaves the job as it is: it runs out, and another worker has it.
		if (became === 'done' || !ending.signal.aborted) await taker.done(id);
		failures.delete(key);
	} catch (error) {
		if (isOfDatabase(error)) throw error;
		const count = (failures.get(key) ?? 0) + 1;
		failures.set(key, count);
		log().error({ err: error, chunk: key, count }, 'a chunk could not be computed');
		if (count >= FAILURES_MOST) {
			await fail(data, error instanceof Error ? error.message : String(error));
			await taker.done(id);
		}
	}
}

/** Lost connections come back; they say nothing of the chunk. */
function isOfDatabase(error: unknown): boolean {
	const { code, cause } = error as { code?: unknown; cause?: { code?: unknown } };
	const text = String(code ?? cause?.code ?? '');
	return /^(CONNECTION|ECONN|CONNECT_TIMEOUT|57P|08)/.test(text);
}

log().info('worker started');
process.send?.('ready');
while (!ending.signal.aborted) {
	let taker: Taker | undefined;
	try {
		taker = await openTaker();
		await serve(taker);
	} catch (error) {
		if (ending.signal.aborted) break;
		log().warn({ err: error }, 'the queue cannot be reached; trying again');
		await sleep(TROUBLE_MS);
	} finally {
		await taker?.close().catch(() => undefined);
	}
}
await closeDatabase().catch(() => undefined);
log().info('worker ended');
process.exit(0);
