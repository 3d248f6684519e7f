import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { forceLine } from '../../src/lib/server/api/openapi-forces.ts';
import { aRequest, gold, post, silica } from '../support/force-requests.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

let server: TestServer;
beforeAll(async () => {
	server = await startTestServer({ HAIRSBREADTH_THREADS: '1' });
}, 180_000);
afterAll(() => server?.stop());

const curve = (count: number, temperatureK: number, relativeAccuracy = 1e-6) =>
	aRequest((r) => {
		r.separationsNm = { from: 10, to: 1000, count, spacing: 'log' };
		r.arrangement.temperatureK = temperatureK;
		r.relativeAccuracy = relativeAccuracy;
	});

const LINES = { accept: 'application/x-ndjson' };

async function linesOf(answer: Response) {
	const text = await answer.text();
	expect(text.endsWith('\n')).toBe(true);
	return text
		.trimEnd()
		.split('\n')
		.map((line) => forceLine.parse(JSON.parse(line)));
}

describe('POST /api/v1/forces', () => {
	it('answers the curve with its origin', async () => {
		const answer = await post(server.origin, aRequest());
		const result = await answer.json();
		expect(answer.headers.get('content-type')).toBe('application/json');
		expect(answer.headers.get('cache-control')).toBe('no-store');
		expect(result).toMatchObject({
			engine: expect.stringMatching(/^\d+\.\d+\.\d+$/),
			runtime: `node ${process.version}`,
			inputChecksum: expect.stringMatching(/^sha256:[0-9a-f]{64}$/),
			separationsNm: [20, 50, 100],
			versions: [{ ref: gold.version, state: 'published', checksum: expect.stringMatching(/^sha256:/) }]
		});
		for (const point of result.points) {
			expect(point.pressurePa).toBeLessThan(0);
			expect(point.met).toBe(true);
			expect(point.errorBound.pressure).toBeLessThanOrEqual(1e-6);
		}
	});

	it('answers the same bits again, from the cache or as lines', async () => {
		const request = curve(60, 301);
		const first = await (await post(server.origin, request)).text();
		const second = await (await post(server.origin, request)).text();
		expect(second).toBe(first);
		const result = JSON.parse(first);
		const lines = await linesOf(await post(server.origin, request, LINES));
		const points = lines.flatMap((line) => (line.type === 'points' ? line.points : []));
		expect(points).toEqual(result.points);
	});

	it('names equal questions by one checksum and different ones by different', async () => {
		const checksum = async (request: object) =>
			(await (await post(server.origin, request)).json()).inputChecksum;
		const plain = await checksum(aRequest());
		expect(await checksum({ ...aRequest(), include: undefined, relativeAccuracy: undefined })).toBe(plain);
		expect(await checksum(aRequest((r) => (r.arrangement.temperatureK = 302)))).not.toBe(plain);
	});

	it('computes a model given in place like the version that holds it', async () => {
		const model = await fetch(`${server.origin}/api/v1/datasets/gold-lorentz-drude/versions/1.0/model.json`);
		const inPlace = { permittivity: await model.json() };
		const pinned = await (await post(server.origin, aRequest())).json();
		const given = await (
			await post(
				server.origin,
				aRequest((r) => {
					r.arrangement.left.substrate = inPlace;
					r.arrangement.right.substrate = inPlace;
				})
			)
		).json();
		expect(given.inputChecksum).toBe(pinned.inputChecksum);
		expect(given.points).toEqual(pinned.points);
		expect(given.versions).toEqual([]);
	});
});

describe('a curve as lines', () => {
	it('comes as start, points coarse to fine, end', async () => {
		const answer = await post(server.origin, curve(400, 303), LINES);
		expect(answer.headers.get('content-type')).toBe('application/x-ndjson');
		const lines = await linesOf(answer);
		const [start] = lines;
		if (start.type !== 'start') throw new Error(`begins with ${start.type}`);
		expect(start.separationsNm).toHaveLength(400);
		expect(lines.at(-1)?.type).toBe('end');
		const chunks = lines.slice(1, -1);
		expect(chunks.every(({ type }) => type === 'points')).toBe(true);
		const indices = chunks.flatMap((line) => (line.type === 'points' ? line.indices : []));
		expect([...indices].sort((a, b) => a - b)).toEqual(Array.from({ length: 400 }, (_, i) => i));
		const [overview] = chunks;
		if (overview.type !== 'points') throw new Error('no points');
		expect(overview.indices).toContain(0);
		expect(overview.indices).toContain(399);
		expect(overview.indices.length).toBeLessThan(64);
		for (const line of chunks) {
			if (line.type !== 'points') continue;
			expect(line.points.map(({ separationNm }) => separationNm)).toEqual(
				line.indices.map((index) => start.separationsNm[index])
			);
		}
	});

	it('has its first points within 0.3 s', async () => {
		await post(server.origin, curve(50, 304));
		const asked = performance.now();
		const answer = await post(server.origin, curve(400, 305), LINES);
		const reader = answer.body?.pipeThrough(new TextDecoderStream()).getReader();
		let text = '';
		while (reader && !text.includes('"type":"points"')) text += (await reader.read()).value ?? '';
		expect(performance.now() - asked).toBeLessThan(300);
		await reader?.cancel();
	});

	it('refuses before the first line with an ordinary answer', async () => {
		const answer = await post(
			server.origin,
			aRequest((r) => (r.separationsNm = [0.001])),
			LINES
		);
		expect(answer.status).toBe(422);
		expect(answer.headers.get('content-type')).toBe('application/json');
	});

	it('computes once for two who ask at the same time', async () => {
		const request = heavy(306);
		const [one, two] = await Promise.all([
			post(server.origin, request, LINES),
			post(server.origin, request, LINES)
		]);
		const [first, second] = await Promise.all([linesOf(one), linesOf(two)]);
		const pointsOf = (lines: typeof first) =>
			lines
				.flatMap((line) => (line.type === 'points' ? line.points : []))
				.sort((a, b) => a.separationNm - b.separationNm);
		expect(pointsOf(first)).toEqual(pointsOf(second));
	});
});

/** Seconds of work for one thread, a different question for each temperature. */
function heavy(temperatureK: number) {
	return aRequest((r) => {
		r.arrangement.left.layers = new Array(20).fill(0).map((_, i) => ({ of: silica, thicknessNm: 2 + i }));
		r.arrangement.right.layers = r.arrangement.left.layers;
		r.arrangement.temperatureK = temperatureK;
		r.separationsNm = { from: 5, to: 500, count: 600 };
		r.relativeAccuracy = 1e-10;
	});
}

describe('a caller who hangs up', () => {
	it.each([
		['waiting for one answer', {}],
		['reading lines', LINES]
	])('while %s frees the thread for the next', async (_how, headers) => {
		const temperature = 310 + Object.keys(headers).length;
		const aloneAt = performance.now();
		await (await post(server.origin, curve(5, temperature + 100))).text();
		const alone = performance.now() - aloneAt;

		const caller = new AbortController();
		const abandoned = post(server.origin, heavy(temperature), headers, caller.signal)
			.then((answer) => answer.text())
			.catch((error: Error) => error.name);
		await new Promise((resolve) => setTimeout(resolve, 300));
		caller.abort();
		expect(await abandoned).toBe('AbortError');

		const asked = performance.now();
		const answer = await post(server.origin, curve(5, temperature + 200));
		expect(answer.status).toBe(200);
		expect(performance.now() - asked).toBeLessThan(alone + 500);
	});
});
