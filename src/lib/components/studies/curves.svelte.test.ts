import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { ForcePoint } from '../../engine/contract.ts';
import { choiceRequest } from '../../schemas/study-request.ts';
import { WORKED_STUDY } from '../../schemas/study-worked.ts';
import { Curve } from './curves.svelte.ts';

const request = (temperatureK: number) =>
	choiceRequest({ ...WORKED_STUDY, temperatureK }, WORKED_STUDY.choices[0], [10, 20]);

const point = (separationNm: number): ForcePoint => ({
	separationNm,
	freeEnergyJPerM2: -1,
	pressurePa: -1,
	pressureGradientPaPerM: 1,
	errorBound: { freeEnergy: 0, pressure: 0, pressureGradient: 0 },
	met: true
});

const START = JSON.stringify({
	type: 'start',
	inputChecksum: 'sha256:0',
	engine: '1.0.0',
	separationsNm: [10, 20]
});
const points = (indices: number[], at: number[]) =>
	JSON.stringify({ type: 'points', indices, points: at.map(point) });
const END = JSON.stringify({ type: 'end', equilibria: [], warnings: [] });

/** A server whose answers are written line by line. */
function aServer() {
	const calls: { send: (line: string) => void; close: () => void; signal: AbortSignal }[] = [];
	vi.stubGlobal('fetch', async (_: string, { signal }: { signal: AbortSignal }) => {
		let inner: ReadableStreamDefaultController<Uint8Array>;
		const body = new ReadableStream<Uint8Array>({ start: (controller) => void (inner = controller) });
		signal.addEventListener('abort', () => inner.error(new Error('aborted')));
		calls.push({
			send: (line) => {
				inner.enqueue(new TextEncoder().encode(`${line}\n`));
				if (line === END) inner.close();
			},
			close: () => inner.close(),
			signal
		});
		return new Response(body);
	});
	return calls;
}

const settle = () => vi.advanceTimersByTimeAsync(200);

describe('a curve', () => {
	beforeEach(() => void vi.useFakeTimers());
	afterEach(() => {
		vi.useRealTimers();
		vi.unstubAllGlobals();
	});

	it('shows points as they come, with a hole where one has not', async () => {
		const calls = aServer();
		const curve = new Curve();
		curve.ask(request(300));
		await settle();
		calls[0].send(START);
		calls[0].send(points([1], [20]));
		await settle();
		expect(curve.points.map((known) => known?.separationNm)).toEqual([undefined, 20]);
		expect([curve.state, curve.computed, curve.total]).toEqual(['computing', 1, 2]);
		calls[0].send(points([0], [10]));
		calls[0].send(END);
		await settle();
		expect([curve.state, curve.engine, curve.computed]).toEqual(['complete', '1.0.0', 2]);
	});

	it('asks the same question once', async () => {
		const calls = aServer();
		const curve = new Curve();
		curve.ask(request(300));
		curve.ask(request(300));
		await settle();
		expect(calls).toHaveLength(1);
	});

	it('gives up the old question for a new one, and keeps the old curve to dim', async () => {
		const calls = aServer();
		const curve = new Curve();
		curve.ask(request(300));
		await settle();
		for (const line of [START, points([0, 1], [10, 20]), END]) calls[0].send(line);
		await settle();
		curve.ask(request(310));
		expect(curve.fresh).toBe(false);
		expect(curve.previous).toHaveLength(2);
		await settle();
		curve.ask(request(320));
		expect(calls[1].signal.aborted).toBe(true);
		await settle();
		for (const line of [START, points([0, 1], [10, 20]), END]) calls[2].send(line);
		await settle();
		expect([curve.state, curve.fresh, curve.previous]).toEqual(['complete', true, []]);
	});

	it('says that it is slow only after a second', async () => {
		aServer();
		const curve = new Curve();
		curve.ask(request(300));
		await vi.advanceTimersByTimeAsync(900);
		expect(curve.slow).toBe(false);
		await vi.advanceTimersByTimeAsync(200);
		expect(curve.slow).toBe(true);
	});

	it('keeps what came when it is stopped, and does not call it complete', async () => {
		const calls = aServer();
		const curve = new Curve();
		curve.ask(request(300));
		await settle();
		calls[0].send(START);
		calls[0].send(points([0], [10]));
		await settle();
		curve.cancel();
		await settle();
		expect(curve.state).toBe('waiting');
		expect(curve.points[0]?.separationNm).toBe(10);
		expect(curve.problem).toBeUndefined();
	});

	it('tells a server out of reach from one that refuses, and tries again when asked to wait', async () => {
		const curve = new Curve();
		vi.stubGlobal('fetch', async () => {
			throw new TypeError('network');
		});
		curve.ask(request(300));
		await settle();
		expect(curve.problem?.message).toContain('cannot be reached');

		let calls = 0;
		vi.stubGlobal('fetch', async () => {
			calls++;
			const error = { code: 'too-many', message: 'Computing is limited.' };
			return new Response(JSON.stringify({ error }), { status: 429, headers: { 'retry-after': '5' } });
		});
		curve.ask(request(310));
		await settle();
		expect(curve.problem).toMatchObject({ message: 'Computing is limited.', retryAfter: 5 });
		await vi.advanceTimersByTimeAsync(5000);
		expect(calls).toBe(2);
		curve.clear();
		await vi.advanceTimersByTimeAsync(20_000);
		expect(calls).toBe(2);
	});
});
