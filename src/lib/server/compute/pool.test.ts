import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { ForceRequest } from '../../engine/contract.ts';
import type { Chunk, Start } from './messages.ts';
import { Cancelled } from '../limits/refusals.ts';
import { EnginePool } from './pool.ts';

/** Threads that do on demand what the engine does only by accident; the request says what. */
const ACTING_THREAD = `
	const sleep = (ms) => Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, ms);
	export default function run({ request, port, stop }) {
		port.postMessage({ type: 'begun' });
		if (request.act === 'throw') throw new Error('a bug');
		if (request.act === 'silent') return;
		if (request.act === 'refuse') port.postMessage({ type: 'refused', issues: [{ path: 'separationsNm', message: 'too near' }] });
		if (request.act === 'swallow') { const kept = []; for (;;) kept.push(new Array(1e6).fill(kept.length)); }
		if (request.act === 'deaf') for (;;) sleep(20);
		if (request.act === 'long') while (!Atomics.load(stop, 0)) sleep(5);
		port.postMessage({ type: 'start', separationsNm: [1, 2] });
		port.postMessage({ type: 'points', indices: [1], points: [{ separationNm: 2 }] });
		port.postMessage({ type: 'points', indices: [0], points: [{ separationNm: 1 }] });
		port.postMessage({ type: 'end', equilibria: [], warnings: [{ code: 'thread', text: String(process.pid) }] });
	}`;

let folder = '';
let pool: EnginePool;

const acting = (act: string) => ({ act }) as unknown as ForceRequest;
const never = new AbortController().signal;
const ignore = { onStart: () => undefined, onPoints: () => undefined };

function open(options: { threads?: number; timeLimitMs?: number } = {}): EnginePool {
	pool = new EnginePool({ threads: 1, task: join(folder, 'acting-thread.mjs'), ...options });
	return pool;
}

beforeAll(() => {
	folder = mkdtempSync(join(tmpdir(), 'pool-'));
	writeFileSync(join(folder, 'acting-thread.mjs'), ACTING_THREAD);
});
afterEach(() => pool.close());
afterAll(() => rmSync(folder, { recursive: true }));

describe('EnginePool', () => {
	it('hands on start, points and end in the order in which the thread said them', async () => {
		const heard: (Start | Chunk)[] = [];
		const end = await open().run(
			acting('work'),
			{ onStart: (start) => heard.push(start), onPoints: (chunk) => heard.push(chunk) },
			never
		);
		expect(heard).toEqual([
			{ separationsNm: [1, 2] },
			{ indices: [1], points: [{ separationNm: 2 }] },
			{ indices: [0], points: [{ separationNm: 1 }] }
		]);
		expect(end.warnings[0].code).toBe('thread');
	});

	it('gives the reasons of a refusal', async () => {
		await expect(open().run(acting('refuse'), ignore, never)).rejects.toMatchObject({
			name: 'InvalidInput',
			code: 'refused',
			issues: [{ path: 'separationsNm', message: 'too near' }]
		});
	});

	it.each(['throw', 'silent'])('reports a thread that ends badly (%s) and goes on working', async (act) => {
		await expect(open().run(acting(act), ignore, never)).rejects.toThrow(Error);
		expect((await pool.run(acting('work'), ignore, never)).equilibria).toEqual([]);
	});

	it('survives a thread that runs out of memory', async () => {
		await expect(open().run(acting('swallow'), ignore, never)).rejects.toMatchObject({
			code: 'memory-limit'
		});
		expect((await pool.run(acting('work'), ignore, never)).equilibria).toEqual([]);
	}, 20_000);

	it('stops what takes too long', async () => {
		await expect(open({ timeLimitMs: 50 }).run(acting('long'), ignore, never)).rejects.toMatchObject({
			code: 'time-limit'
		});
	});

	// A deaf thread never ends by itself: that the next one begins at all shows that it was stopped.
	it.each(['long', 'deaf'])('is free again after a cancellation (%s)', { timeout: 30_000 }, async (act) => {
		const caller = new AbortController();
		const first = open().run(acting(act), ignore, caller.signal);
		setTimeout(() => caller.abort(), 100);
		await expect(first).rejects.toBeInstanceOf(Cancelled);
		expect((await pool.run(acting('work'), ignore, never)).equilibria).toEqual([]);
	});

	it('drops what is cancelled while it waits', async () => {
		const running = new AbortController();
		const waiting = new AbortController();
		const first = open().run(acting('long'), ignore, running.signal);
		const second = pool.run(acting('work'), ignore, waiting.signal);
		expect(pool.waiting).toBe(1);
		waiting.abort();
		await expect(second).rejects.toBeInstanceOf(Cancelled);
		expect(pool.waiting).toBe(0);
		running.abort();
		await expect(first).rejects.toBeInstanceOf(Cancelled);
	});

	it('does not begin for a caller that is gone already', async () => {
		await expect(open().run(acting('work'), ignore, AbortSignal.abort())).rejects.toBeInstanceOf(Cancelled);
	});
});
