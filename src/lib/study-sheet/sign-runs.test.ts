import { describe, expect, it } from 'vitest';
import { crossing, disagreement, signRuns } from './sign-runs.ts';

describe('sign runs', () => {
	it('meet where the curve crosses zero', () => {
		const runs = signRuns({ separationsNm: [1, 10, 1000], values: [-3, -1, 1] });
		expect(runs).toEqual([
			{ fromNm: 1, toNm: 100, sign: -1 },
			{ fromNm: 100, toNm: 1000, sign: 1 }
		]);
	});

	it('are one where the sign never changes, and none without points', () => {
		expect(signRuns({ separationsNm: [1, 10], values: [2, 1] })).toEqual([{ fromNm: 1, toNm: 10, sign: 1 }]);
		expect(signRuns({ separationsNm: [], values: [] })).toEqual([]);
	});

	it('keep an exact zero apart: no force is neither attraction nor repulsion', () => {
		expect(signRuns({ separationsNm: [1, 10], values: [0, 0] })).toEqual([{ fromNm: 1, toNm: 10, sign: 0 }]);
	});

	it('cross nearer to the smaller value', () => {
		expect(crossing(1, -1, 100, 9)).toBeCloseTo(100 ** 0.1, 12);
	});

	it('tell where curves disagree', () => {
		const first = signRuns({ separationsNm: [1, 10, 1000], values: [-3, -1, 1] });
		const second = signRuns({ separationsNm: [1, 1000], values: [2, 1] });
		expect(disagreement([first, second])).toEqual([{ fromNm: 1, toNm: 100 }]);
		expect(disagreement([first])).toEqual([]);
	});
});
