import { describe, expect, it, vi } from 'vitest';
import type { ForcePoint } from '../../engine/contract.ts';
import type { Chunk, End } from './messages.ts';
import { Cancelled } from '../limits/refusals.ts';
import type { Progress } from './pool.ts';
import { ResultCache, type Compute } from './result-cache.ts';

const never = new AbortController().signal;
const point = (separationNm: number) => ({ separationNm }) as ForcePoint;

function listener() {
	const chunks: Chunk[] = [];
	const progress: Progress = { onStart: vi.fn(), onPoints: (chunk) => chunks.push(chunk) };
	return { progress, chunks };
}

/** A computation of two points whose steps the test takes. */
function stepwise() {
	let progress: Progress | undefined;
	let finish = (_end: End) => {};
	let fail = (_error: Error) => {};
	let signal = never;
	const compute = vi.fn<Compute>((given, givenSignal) => {
		progress = given;
		signal = givenSignal;
		return new Promise((resolve, reject) => {
			finish = resolve;
			fail = reject;
			givenSignal.addEventListener('abort', () => reject(new Cancelled()));
		});
	});
	return {
		compute,
		stopped: () => signal.aborted,
		start: () => progress?.onStart({ separationsNm: [1, 2] }),
		tell: (index: number) => progress?.onPoints({ indices: [index], points: [point(index + 1)] }),
		end: () => finish({ equilibria: [], warnings: [] }),
		fail: (error: Error) => fail(error)
	};
}

const whole = { separationsNm: [1, 2], points: [point(1), point(2)], equilibria: [], warnings: [] };

describe('ResultCache', () => {
	it('computes equal requests once, and tells the later one what is there already', async () => {
		const cache = new ResultCache(1e6);
		const work = stepwise();
		const first = listener();
		const second = listener();
		const one = cache.get('key', work.compute, first.progress, never);
		work.start();
		work.tell(1);
		const two = cache.get('key', work.compute, second.progress, never);
		work.tell(0);
		work.end();
		expect(await one).toEqual(whole);
		expect(await two).toEqual(whole);
		expect(work.compute).toHaveBeenCalledTimes(1);
		expect(second.progress.onStart).toHaveBeenCalledTimes(1);
		expect(second.chunks.map(({ indices }) => indices)).toEqual([[1], [0]]);
	});

	it('answers again without computing, points in the order of the separations', async () => {
		const cache = new ResultCache(1e6);
		const work = stepwise();
		const one = cache.get('key', work.compute, listener().progress, never);
		work.start();
		work.tell(1);
		work.tell(0);
		work.end();
		await one;
		const late = listener();
		expect(await cache.get('key', work.compute, late.progress, never)).toEqual(whole);
		expect(late.chunks).toEqual([{ indices: [0, 1], points: [point(1), point(2)] }]);
		expect(work.compute).toHaveBeenCalledTimes(1);
	});

	it('goes on while one of two callers is left and stops with the last', async () => {
		const cache = new ResultCache(1e6);
		const work = stepwise();
		const callers = [new AbortController(), new AbortController()];
		const waits = callers.map(({ signal }) => cache.get('key', work.compute, listener().progress, signal));
		callers[0].abort();
		await expect(waits[0]).rejects.toBeInstanceOf(Cancelled);
		expect(work.stopped()).toBe(false);
		callers[1].abort();
		await expect(waits[1]).rejects.toBeInstanceOf(Cancelled);
		expect(work.stopped()).toBe(true);
		expect(cache.has('key')).toBe(false);
	});

	it('begins anew for whoever asks right after the last has gone', async () => {
		const cache = new ResultCache(1e6);
		const work = stepwise();
		const caller = new AbortController();
		const first = cache.get('key', work.compute, listener().progress, caller.signal);
		caller.abort();
		const second = cache.get('key', work.compute, listener().progress, never);
		await expect(first).rejects.toBeInstanceOf(Cancelled);
		expect(work.compute).toHaveBeenCalledTimes(2);
		work.start();
		work.tell(0);
		work.tell(1);
		work.end();
		expect(await second).toEqual(whole);
	});

	it('keeps no failure', async () => {
		const cache = new ResultCache(1e6);
		const work = stepwise();
		const first = cache.get('key', work.compute, listener().progress, never);
		work.fail(new Error('once'));
		await expect(first).rejects.toThrow('once');
		expect(cache.has('key')).toBe(false);
	});

	it('drops what was used longest ago when it is full', async () => {
		const cache = new ResultCache(4500);
		const put = async (key: string) => {
			const work = stepwise();
			const result = cache.get(key, work.compute, listener().progress, never);
			work.start();
			work.tell(0);
			work.tell(1);
			work.end();
			await result;
		};
		await put('a');
		await put('b');
		await cache.get('a', stepwise().compute, listener().progress, never);
		await put('c');
		expect(['a', 'b', 'c'].map((key) => cache.has(key))).toEqual([true, false, true]);
	});
});
