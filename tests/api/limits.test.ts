import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { setClock } from '../../src/lib/server/clock.ts';
import { charge } from '../../src/lib/server/limits/rate.ts';
import { aRequest, post, silica } from '../support/force-requests.ts';
import { useDatabase } from '../support/database.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

describe('charge', () => {
	const db = useDatabase();
	const limit = { name: 'test', amount: 10, windowSeconds: 60, what: 'computing time' };
	const at = (iso: string) => setClock(() => new Date(iso));

	beforeAll(async () => {
		await db.sql`grant select, insert, update, delete on rate_counter to hairsbreadth_app`;
	});
	beforeEach(async () => {
		await db.sql`delete from rate_counter`;
		at('2026-03-01T12:00:10Z');
	});
	afterEach(() => setClock());

	it('lets a caller use the whole amount and nothing beyond', async () => {
		await charge(limit, 'a', 6);
		await charge(limit, 'a', 4);
		await expect(charge(limit, 'a', 0.1)).rejects.toMatchObject({
			name: 'TooManyRequests',
			retryAfterSeconds: 50
		});
	});

	it('counts each caller and each limit apart', async () => {
		await charge(limit, 'a', 10);
		await charge(limit, 'b', 10);
		await charge({ ...limit, name: 'other' }, 'a', 10);
		await expect(charge(limit, 'b', 1)).rejects.toMatchObject({ name: 'TooManyRequests' });
	});

	it('begins anew with the next window', async () => {
		await charge(limit, 'a', 10);
		at('2026-03-01T12:01:00Z');
		await charge(limit, 'a', 10);
		await expect(charge(limit, 'a', 1)).rejects.toMatchObject({ retryAfterSeconds: 60 });
	});

	it('does not charge what it refuses', async () => {
		await charge(limit, 'a', 6);
		await expect(charge(limit, 'a', 5)).rejects.toMatchObject({ name: 'TooManyRequests' });
		await charge(limit, 'a', 4);
		await expect(charge(limit, 'c', 11)).rejects.toMatchObject({ name: 'TooManyRequests' });
	});

	it('lets exactly as many through as fit when all ask at once', async () => {
		const asked = await Promise.allSettled(Array.from({ length: 40 }, () => charge(limit, 'a', 1)));
		expect(asked.filter(({ status }) => status === 'fulfilled')).toHaveLength(10);
	});

	it('sweeps windows that are long over', async () => {
		await db.sql`insert into rate_counter values ('test:old', ${Date.parse('2026-03-01T08:00:00Z') / 1000}, 1)`;
		at('2026-03-01T14:00:00Z');
		await charge(limit, 'a', 1);
		const rows = await db.sql`select key from rate_counter`;
		expect(rows.map(({ key }) => key)).toEqual(['test:a']);
	});
});

describe('the limit on computing', () => {
	let one: TestServer;
	beforeAll(async () => {
		one = await startTestServer({
			HAIRSBREADTH_COMPUTE_SECONDS: '0.05',
			ADDRESS_HEADER: 'x-forwarded-for',
			XFF_DEPTH: '1'
		});
	}, 180_000);
	afterAll(() => one?.stop());

	const ask = (forwardedFor: string, temperatureK: number) =>
		post(
			one.origin,
			aRequest((r) => {
				r.arrangement.temperatureK = temperatureK;
				r.arrangement.left.substrate = silica;
			}),
			{ 'x-forwarded-for': forwardedFor }
		);

	it('answers 429 with the time to wait in the shape of the API, and leaves others alone', async () => {
		const answers: Response[] = [];
		for (let i = 0; i < 8; i++) answers.push(await ask('203.0.113.7', 400 + i));
		const refused = answers.find(({ status }) => status === 429);
		expect(answers[0].status).toBe(200);
		expect(Number(refused?.headers.get('retry-after'))).toBeGreaterThan(0);
		expect(Number(refused?.headers.get('retry-after'))).toBeLessThanOrEqual(60);
		expect(await refused?.json()).toEqual({
			error: { code: 'too-many-requests', message: expect.stringContaining('computing time') }
		});
		expect((await ask('203.0.113.8', 420)).status).toBe(200);
	});

	it('is not escaped by an address that the caller writes into the header itself', async () => {
		const statuses: number[] = [];
		for (let i = 0; i < 8; i++) {
			statuses.push((await ask(`198.51.100.${i}, 203.0.113.9`, 430 + i)).status);
		}
		expect(statuses).toContain(429);
	});

	it('keeps no address in clear for longer than an hour, and never what was asked', async () => {
		const rows = await one.sql`select * from rate_counter`;
		expect(rows.length).toBeGreaterThan(0);
		for (const row of rows) expect(Object.keys(row).sort()).toEqual(['key', 'used', 'window_start']);
	});
});
