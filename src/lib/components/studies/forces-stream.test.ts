import { describe, expect, it } from 'vitest';
import { choiceRequest } from '../../schemas/study-request.ts';
import { WORKED_STUDY } from '../../schemas/study-worked.ts';
import { computeForces, ForcesRefused, linesOf } from './forces-stream.ts';

const request = choiceRequest(WORKED_STUDY, WORKED_STUDY.choices[0]);
const bytes = (text: string) => new TextEncoder().encode(text);

async function* pieces(...texts: string[]) {
	yield* texts.map(bytes);
}

function answering(body: string, init: ResponseInit = {}) {
	const received: unknown[] = [];
	const listener = {
		start: ({ separationsNm }: { separationsNm: number[] }) => received.push(separationsNm.length),
		points: (indices: readonly number[]) => received.push([...indices])
	};
	const send: typeof fetch = async () => new Response(body, init);
	const run = computeForces(request, listener, { signal: new AbortController().signal, fetch: send });
	return { run, received };
}

describe('lines of a stream', () => {
	it('are whole however the bytes are cut, within a letter too', async () => {
		const micro = bytes('"µ"\n');
		async function* cut() {
			yield micro.slice(0, 2);
			yield micro.slice(2);
			yield* pieces('1\n\n2', '3\n4');
		}
		const lines = [];
		for await (const line of linesOf(cut())) lines.push(line);
		expect(lines).toEqual(['"µ"', '1', '23', '4']);
	});
});

describe('asking for forces', () => {
	const start = '{"type":"start","inputChecksum":"sha256:0","engine":"1.0.0","separationsNm":[1,2]}\n';

	it('hands on start and points and answers with the end', async () => {
		const { run, received } = answering(
			`${start}{"type":"points","indices":[1],"points":[{}]}\n{"type":"end","equilibria":[],"warnings":[]}\n`
		);
		await expect(run).resolves.toMatchObject({
			equilibria: [],
			warnings: [],
			receivedAt: expect.stringMatching(/Z$/)
		});
		expect(received).toEqual([2, [1]]);
	});

	it('tells which field the server refused', async () => {
		const issues = [{ path: 'arrangement.temperatureK', message: 'is above 5000 K' }];
		const body = JSON.stringify({ error: { code: 'invalid', message: 'not computed', issues } });
		await expect(answering(body, { status: 422 }).run).rejects.toMatchObject({ code: 'invalid', issues });
	});

	it('tells when to come back', async () => {
		const body = JSON.stringify({ error: { code: 'rate', message: 'wait' } });
		const { run } = answering(body, { status: 429, headers: { 'retry-after': '7' } });
		await expect(run).rejects.toMatchObject({ retryAfter: 7 });
	});

	it('does not take a page of a broken proxy for an answer', async () => {
		await expect(answering('<html>', { status: 502 }).run).rejects.toBeInstanceOf(ForcesRefused);
	});

	it('says so where the stream ends early or with an error', async () => {
		await expect(answering(start).run).rejects.toMatchObject({ code: 'cut-off' });
		const error = '{"type":"error","error":{"code":"time-limit","message":"took too long"}}\n';
		await expect(answering(start + error).run).rejects.toMatchObject({ code: 'time-limit' });
	});
});
