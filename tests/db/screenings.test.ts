import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { setTimeout as sleep } from 'node:timers/promises';
import { screeningKernel } from '../../src/lib/engine/screening.ts';
import type { SignedIn } from '../../src/lib/schemas/person.ts';
import { newScreening, screeningStatement } from '../../src/lib/schemas/screening.ts';
import { cellAt, cellsIn } from '../../src/lib/screening/cells.ts';
import { Forbidden, InvalidInput, NotFound, StateError } from '../../src/lib/server/errors.ts';
import { resolve } from '../../src/lib/server/library/versions.ts';
import { planScreening } from '../../src/lib/server/screening/plan.ts';
import * as screenings from '../../src/lib/server/screening/screenings.ts';
import { demoPeople } from '../support/curators.ts';
import { useDatabase } from '../support/database.ts';
import { openWorkers, type TestWorker } from '../support/workers.ts';

/** Screenings: planned, computed by real workers that are killed, steered, and the same bits whatever happened. */

const database = useDatabase();
let people: Record<string, SignedIn>;
let workers: Awaited<ReturnType<typeof openWorkers>>;

beforeAll(async () => {
	people = await demoPeople();
	workers = await openWorkers(database.applicationUrl);
}, 120_000);
afterAll(() => workers.close());

const METALS = { class: 'metal' as const };
const statement = (over: Record<string, unknown> = {}) => ({
	left: METALS,
	medium: { class: 'liquid' },
	separationsNm: [10, 50, 100],
	criterion: { kind: 'repulsive' },
	...over
});
const wanted = (over: Record<string, unknown> = {}, name = 'Metals in liquids') =>
	newScreening.parse({ name, statement: statement(over) });

async function ended(actor: SignedIn, id: string, patience = 60_000): Promise<void> {
	const until = Date.now() + patience;
	for (;;) {
		const { screening } = await screenings.get(actor, id);
		if (!screenings.LIVE_STATES.includes(screening.state)) return;
		if (Date.now() > until)
			throw new Error(`still ${screening.state}, ${screening.cellsDone} of ${screening.cells}`);
		await sleep(100);
	}
}

describe('a plan', () => {
	it('names one version a material, or all of them, and counts what it costs', async () => {
		const one = await planScreening(screeningStatement.parse(statement()));
		const slugs = one.left.map(({ of }) => one.materials[of].slug);
		expect(new Set(slugs).size).toBe(slugs.length);
		expect(one.left.every(({ reference }) => reference)).toBe(true);
		const all = await planScreening(screeningStatement.parse(statement({ rivals: 'all' })));
		expect(all.left.length).toBeGreaterThan(one.left.length);
		expect(all.left.filter(({ reference }) => reference)).toHaveLength(one.left.length);
		expect(one.media.every(({ of }) => one.materials[of].class === 'liquid')).toBe(true);
	});

	it('says what fits nothing, what is not there, and which limit is passed', async () => {
		const refused = (over: Record<string, unknown>) =>
			planScreening(screeningStatement.parse(statement(over))).catch((error: unknown) => error);
		expect(await refused({ left: { search: 'unobtainium' } })).toMatchObject({ issues: [{ path: 'left' }] });
		expect(await refused({ medium: { versions: ['water@99.0'] } })).toMatchObject({
			issues: [{ message: 'there is no published version water@99.0' }]
		});
		const much = {
			left: { coating: { of: 'gold-drude@1.0', thicknessNm: { from: 1, to: 100, count: 40 } } },
			rivals: 'all',
			separationsNm: Array.from({ length: 20 }, (_, index) => index + 1)
		};
		const error = await refused(much);
		expect(error).toBeInstanceOf(InvalidInput);
		expect(error).toMatchObject({
			message: expect.stringMatching(/at most (10,000,000|2000)|cannot be planned/)
		});
	});

	it('keeps hazardous liquids out where that is asked', async () => {
		const mild = await planScreening(
			screeningStatement.parse(statement({ medium: { class: 'liquid', hazard: 'none' } }))
		);
		const any = await planScreening(screeningStatement.parse(statement()));
		expect(mild.media.length).toBeLessThan(any.media.length);
		expect(mild.media.every(({ of }) => mild.materials[of].hazard === 'none')).toBe(true);
	});
});

describe('a screening', () => {
	it('computes what the kernel computes, cell by cell, and then changes no more', async () => {
		const { researcher } = people;
		const worker = await workers.start();
		const { id } = await screenings.create(researcher, wanted({ rules: ['drude', 'plasma'] }));
		await ended(researcher, id);
		await worker.stop();
		const { row } = await screenings.get(researcher, id);
		expect(row).toMatchObject({ state: 'finished', cellsDone: row.cells, chunksDone: row.chunks });
		const { plan } = row;
		expect(row.cells).toBe(cellsIn(plan));
		const chunks =
			await database.sql`select pressures from screening_chunk where screening_id = ${id} order by position`;
		const bytes = Buffer.concat(chunks.map(({ pressures }) => pressures as Buffer));
		const kept = new Float64Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength));
		expect(kept).toHaveLength(row.cells * 3);

		const models = await resolve(plan.materials.map(({ ref }) => ref));
		const kernel = screeningKernel(
			plan.materials.map(({ ref, conducts }) => {
				const permittivity = models.get(ref)?.model ?? { kind: 'vacuum' as const };
				return conducts ? { permittivity, zeroFrequency: 'drude' as const } : { permittivity };
			}),
			300,
			1e-6
		);
		for (const index of [0, 1, 17, Math.floor(row.cells / 2) - 1]) {
			const cell = cellAt(plan, index);
			const body = (of: number) => ({ layers: [], substrate: of });
			const triple = {
				left: body(plan.left[cell.left].of),
				medium: plan.media[cell.medium].of,
				right: body(plan.right[cell.right].of)
			};
			expect([...kept.slice(3 * index, 3 * index + 3)]).toEqual(
				kernel.pressures(triple, plan.separationsNm).map(({ pressurePa }) => pressurePa)
			);
		}
		for (const change of [
			`update screening set checksum = 'x' where id = '${id}'`,
			`update screening set state = 'queued' where id = '${id}'`,
			`update screening set plan = '{}' where id = '${id}'`,
			`delete from screening_chunk where screening_id = '${id}'`,
			`update screening_chunk set pressures = '\\x00' where screening_id = '${id}'`
		])
			await expect(database.sql.unsafe(change), change).rejects.toThrow(/stays as it is/);
	}, 90_000);

	it('has the same bits after its workers were killed and the connections of the database cut', async () => {
		const { researcher } = people;
		const over = { left: { class: 'solid' }, separationsNm: [5, 20, 80, 320] };
		const calm = await screenings.create(researcher, wanted(over, 'Calm'));
		const worker = await workers.start();
		await ended(researcher, calm.id);
		await worker.stop();

		const { id } = await screenings.create(researcher, wanted(over, 'Troubled'));
		let living: TestWorker[] = [await workers.start(), await workers.start()];
		for (let kill = 0; kill < 3; kill += 1) {
			await sleep(250);
			living[0].kill();
			living = [living[1], await workers.start()];
			if (kill === 1)
				await database.sql`select pg_terminate_backend(pid) from pg_stat_activity
					where datname = current_database() and pid <> pg_backend_pid()`.catch(() => undefined);
		}
		await ended(researcher, id, 90_000);
		for (const one of living) await one.stop();
		const [a, b] = [await screenings.get(researcher, calm.id), await screenings.get(researcher, id)];
		expect(b.row.cellsDone).toBe(b.row.cells);
		expect(b.screening.checksum).toBe(a.screening.checksum);
		const [{ chunks, cells }] = await database.sql`select count(*)::int as chunks,
			sum(to_cell - from_cell)::int as cells from screening_chunk where screening_id = ${id} and done_at is not null`;
		expect({ chunks, cells }).toEqual({ chunks: b.row.chunks, cells: b.row.cells });
	}, 150_000);

	it('lets a small one through beside a large one, and is cancelled within a second', async () => {
		const { researcher, curator } = people;
		const worker = await workers.start();
		const large = await screenings.create(
			researcher,
			wanted({ left: { class: 'solid' }, rivals: 'all', separationsNm: [5, 10, 20, 40, 80, 160] }, 'Large')
		);
		expect(large.estimatedSeconds).toBeGreaterThan(20);
		await sleep(600);
		const began = Date.now();
		const small = await screenings.create(
			curator,
			wanted({ left: { versions: ['gold-drude@1.0'] } }, 'Small')
		);
		await ended(curator, small.id, 20_000);
		expect((await screenings.get(curator, small.id)).screening.state).toBe('finished');
		const took = Date.now() - began;
		// Its one chunk waits for the chunk under way; the bound of the statement is five seconds to begin.
		expect(took).toBeLessThan(8000);
		expect((await screenings.get(researcher, large.id)).screening.state).toBe('running');

		await screenings.pause(researcher, large.id);
		await sleep(1200);
		const paused = (await screenings.get(researcher, large.id)).screening;
		await sleep(800);
		expect((await screenings.get(researcher, large.id)).screening.cellsDone).toBe(paused.cellsDone);
		await screenings.resume(researcher, large.id);
		await expect
			.poll(async () => (await screenings.get(researcher, large.id)).screening.cellsDone, { timeout: 15_000 })
			.toBeGreaterThan(paused.cellsDone);
		await screenings.cancel(researcher, large.id);
		await sleep(1000);
		const [{ before }] = await database.sql`select count(*)::int as before from screening_chunk
			where screening_id = ${large.id} and done_at is not null`;
		await sleep(1000);
		const [{ after }] = await database.sql`select count(*)::int as after from screening_chunk
			where screening_id = ${large.id} and done_at is not null`;
		expect(after).toBe(before);
		await expect(screenings.resume(researcher, large.id)).rejects.toBeInstanceOf(StateError);
		await worker.stop();
	}, 90_000);

	it('is steered by its owner, and seen by whom it is shared with', async () => {
		const { researcher, lead, curator, 'researcher-2': stranger } = people;
		const { id } = await screenings.create(researcher, {
			...wanted({ left: { versions: ['gold-drude@1.0'] } }, 'canary screening'),
			visibility: 'group',
			group: 'cantilevers'
		});
		await expect(screenings.get(stranger, id)).rejects.toBeInstanceOf(NotFound);
		await expect(screenings.cancel(lead, id)).rejects.toBeInstanceOf(Forbidden);
		expect((await screenings.get(curator, id)).own).toBe(false);
		const names = async (actor: SignedIn, show: 'mine' | 'others') =>
			(await screenings.list(actor, { ...screenings.screeningQuery.parse({}), show, search: 'canary' }))
				.screenings.length;
		expect([
			await names(researcher, 'mine'),
			await names(lead, 'others'),
			await names(stranger, 'others')
		]).toEqual([1, 1, 0]);
		await expect(screenings.share(lead, id, { visibility: 'private', group: null })).rejects.toBeInstanceOf(
			Forbidden
		);
		await screenings.cancel(researcher, id);
		// Ended or not, who sees it is its owner's to say.
		await screenings.share(researcher, id, { visibility: 'private', group: null });
		await expect(screenings.get(curator, id)).rejects.toBeInstanceOf(NotFound);
	});
});
