import { describe, expect, it } from 'vitest';
import { BENCH_CASES, GROWTH_CASES } from '../../../tests/bench/arrangements.ts';
import { estimateCost } from './cost.ts';
import { plates } from './lifshitz/plates.ts';
import { systemOf } from './system.ts';
import { separationsOf } from './validate.ts';

describe('the estimate of a cost', () => {
	/** Counts are the same on every machine; how long they take is printed by the bench and is no test. */
	it.each([...BENCH_CASES, ...GROWTH_CASES].map(({ name, request }) => [name, request] as const))(
		'knows the integrands of %s within a factor of two',
		(_, request) => {
			const evaluatePlates = plates(systemOf(request), request.relativeAccuracy);
			const separations = separationsOf(request.separationsNm);
			const counted = separations.reduce((sum, nm) => sum + evaluatePlates(nm * 1e-9).evaluations, 0);
			const ratio = estimateCost(request).evaluations / counted;
			expect(ratio).toBeGreaterThan(1 / 2);
			expect(ratio).toBeLessThan(2);
		}
	);

	const [{ request }] = BENCH_CASES;
	const secondsOf = (over: Partial<typeof request>) => estimateCost({ ...request, ...over }).seconds;

	it('grows with separations, and with what is asked for beside', () => {
		const hundred = { from: 10, to: 1e4, count: 100, spacing: 'log' as const };
		const ratio =
			secondsOf({ separationsNm: { ...hundred, count: 1000 } }) / secondsOf({ separationsNm: hundred });
		expect(ratio).toBeCloseTo(10, 1);
		const with_ = (include: (typeof request)['include']) => secondsOf({ include });
		expect(with_(['breakdown'])).toBe(with_([]));
		expect(with_(['terms'])).toBeGreaterThan(2 * with_([]));
		expect(with_(['sensitivity'])).toBeGreaterThan(with_(['terms']));
	});

	it('is finite for requests that no one would accept', () => {
		for (const over of [
			{ separationsNm: [0] },
			{ separationsNm: [] },
			{ relativeAccuracy: 1e-300 },
			{ separationsNm: { from: 1e-9, to: 1e30, count: 5, spacing: 'log' as const } }
		])
			expect(Number.isFinite(secondsOf(over))).toBe(true);
	});
});
