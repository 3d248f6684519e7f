import { describe, expect, it } from 'vitest';
import { disagreements, quartiles } from './disagreement.ts';

const series = (values: number[]) => ({
	separationsNm: [10, 20, 40, 80],
	values,
	bounds: values.map(() => 1e-8),
	met: values.map(() => true)
});

describe('disagreements', () => {
	it('name the largest difference and the first separation of opposite sign', () => {
		const all = [
			{ letter: 'A', series: series([-100, -10, -2, -1]) },
			{ letter: 'B', series: series([-110, -10, -1, 1]) },
			{ letter: 'C', series: series([-100, -10, -2, -1]) }
		];
		expect(disagreements(all, 0)).toEqual([
			{ letter: 'B', largest: { share: 2, atNm: 80 }, opposedFromNm: 80 },
			{ letter: 'C', largest: null, opposedFromNm: null }
		]);
		expect(disagreements(all, 1)[0]).toEqual({
			letter: 'A',
			largest: { share: -2, atNm: 80 },
			opposedFromNm: 80
		});
		expect(disagreements(all, 7)).toEqual([]);
	});
});

describe('quartiles', () => {
	it('are those of the usual definition, linear between ranks (type 7 of Hyndman and Fan 1996)', () => {
		expect(quartiles([4, 1, 3, 2])).toEqual({ least: 1, lower: 1.75, middle: 2.5, upper: 3.25, most: 4 });
		expect(quartiles([-5])).toEqual({ least: -5, lower: -5, middle: -5, upper: -5, most: -5 });
		expect(quartiles([])).toBeUndefined();
	});
});
