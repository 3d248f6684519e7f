import { sql } from 'drizzle-orm';
import { newScreening } from '../../src/lib/schemas/screening.ts';
import { closeDatabase, connect } from '../../src/lib/server/db/client.ts';
import { config } from '../../src/lib/server/config.ts';
import { openTaker } from '../../src/lib/server/jobs/queue.ts';
import * as screenings from '../../src/lib/server/screening/screenings.ts';
import { demoPeople } from '../support/curators.ts';

/**
 * How many chunks a second the database takes, when computing them costs nothing: N takers at once, each on connections of its own,
 * take a job, store a result under the lock of the screening's row, and end the job. Says how many workers one database serves.
 */
const CHUNK_BYTES = 600 * 5 * 8;

export async function contention(takers: number): Promise<{ chunks: number; perSecond: number }> {
	const { researcher } = await demoPeople();
	const { id } = await screenings.create(
		researcher,
		newScreening.parse({
			name: 'Contention',
			statement: {
				left: { class: 'solid' },
				medium: { class: 'liquid' },
				rivals: 'all',
				separationsNm: [5, 10, 20, 40, 80, 160, 320, 640, 1280, 2560, 5120, 9000],
				criterion: { kind: 'repulsive' }
			}
		})
	);
	const { database, close } = connect(config().databaseUrl, takers);
	const all = await Promise.all(Array.from({ length: takers }, () => openTaker()));
	const pressures = Buffer.alloc(CHUNK_BYTES, 1);
	let chunks = 0;
	const began = performance.now();
	await Promise.all(
		all.map(async (taker) => {
			for (;;) {
				const job = await taker.take();
				if (!job) return;
				await database.transaction(async (tx) => {
					await tx.execute(sql`select * from screening where id = ${id} for update`);
					await tx.execute(sql`update screening_chunk set pressures = ${pressures}, bounds = ${pressures}, done_at = now()
						where screening_id = ${id} and position = ${job.data.position} and done_at is null`);
					await tx.execute(
						sql`update screening set chunks_done = chunks_done + 1, state = 'running' where id = ${id}`
					);
				});
				await taker.done(job.id);
				chunks += 1;
			}
		})
	);
	const perSecond = chunks / ((performance.now() - began) / 1000);
	await Promise.all(all.map((taker) => taker.close()));
	await close();
	return { chunks, perSecond };
}

for (const takers of [1, 4, 16, 40]) {
	const { chunks, perSecond } = await contention(takers);
	console.log(`${takers} at once: ${chunks} chunks, ${perSecond.toFixed(0)} a second`);
}
await closeDatabase();
