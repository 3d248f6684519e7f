import { describe, expect, it } from 'vitest';
import { evFromRadPerS, radPerSFromEv } from '../../engine/units.ts';
import { logScale } from '../../study-sheet/log-scale.ts';
import {
	epsilonAt,
	epsilonPaths,
	epsilonSeries,
	extrapolatedShareAt,
	largestDifference,
	ratioOf,
	XI_DOMAIN,
	type EpsilonSeries
} from './epsilon-curves.ts';

const xiRadPerS = Array.from({ length: 181 }, (_, index) => 10 ** (13 + index / 36));
const drude = (plasmaEv: number, dampingEv: number) => (xi: number) =>
	1 + plasmaEv ** 2 / (evFromRadPerS(xi) * (evFromRadPerS(xi) + dampingEv));

function aSeries(eps: (xi: number) => number, over: Partial<EpsilonSeries> = {}): EpsilonSeries {
	return {
		slug: 'a',
		title: 'a',
		letter: 'A',
		ink: 2,
		measuredRangeEv: { low: 0.5, high: 5 },
		xiRadPerS,
		epsilon: xiRadPerS.map(eps),
		extrapolatedShare: null,
		...over
	};
}

describe('epsilonAt', () => {
	it('stays within 3e-4 of the model between its samples', () => {
		const eps = drude(9, 0.035);
		const series = aSeries(eps);
		for (const xi of [1.3e13, 5.55e13, 2.4678e14, 3.3e15, 7.7e17]) {
			expect(Math.abs((epsilonAt(series, xi) ?? 0) / eps(xi) - 1)).toBeLessThan(3e-4);
		}
	});

	it('says nothing outside the samples', () => {
		expect(
			epsilonAt(
				aSeries(() => 2),
				1e12
			)
		).toBeUndefined();
		expect(
			epsilonAt(
				aSeries(() => 2),
				1e19
			)
		).toBeUndefined();
	});

	it('gives 1 for vacuum', () => {
		expect(
			epsilonAt(
				aSeries(() => 1),
				3e14
			)
		).toBe(1);
	});
});

describe('epsilonPaths', () => {
	const x = logScale(XI_DOMAIN, [0, 500]);
	const identity = (value: number) => value;

	it('joins the measured part to both extrapolated ones without a gap', () => {
		const { measured, extrapolated } = epsilonPaths(
			aSeries(() => 2),
			x,
			identity
		);
		const from = x.at(radPerSFromEv(0.5));
		const to = x.at(radPerSFromEv(5));
		const places = [...measured.matchAll(/[ML]([\d.]+) /g)].map((match) => Number(match[1]));
		expect(places[0]).toBeGreaterThanOrEqual(from);
		expect(places[0] - from).toBeLessThan(3);
		expect(Math.abs(places[places.length - 1] - to)).toBeLessThan(3);
		expect(extrapolated.match(/M/g)).toHaveLength(2);
		expect(extrapolated).toContain(`L${measured.slice(1).split('L')[0]}`);
	});

	it('is all extrapolated without a measured range', () => {
		const { measured, extrapolated } = epsilonPaths(
			aSeries(() => 2, { measuredRangeEv: null }),
			x,
			identity
		);
		expect(measured).toBe('');
		expect(extrapolated.match(/[ML]/g)).toHaveLength(xiRadPerS.length);
	});

	it('leaves out samples beyond the axis', () => {
		const narrow = logScale([1e14, 1e16], [0, 500]);
		const { measured, extrapolated } = epsilonPaths(
			aSeries(() => 2),
			narrow,
			identity
		);
		expect(`${measured}${extrapolated}`).not.toContain('-');
	});
});

describe('comparing two datasets', () => {
	it('gives the ratio in per cent and where it is largest', () => {
		const first = aSeries((xi) => 1 + 1.1 * (drude(9, 0.035)(xi) - 1));
		const ratio = ratioOf(first, aSeries(drude(9, 0.035)));
		expect(ratio.percent[0]).toBeCloseTo(10, 3);
		expect(ratio.percent.at(-1)).toBeLessThan(0.5);
		const largest = largestDifference(ratio);
		expect(largest?.percent).toBeCloseTo(10, 3);
		expect(largest?.xiRadPerS).toBeLessThan(1e14);
	});

	it('is zero for a dataset against itself', () => {
		const series = aSeries(drude(9, 0.035));
		for (const percent of ratioOf(series, series).percent) expect(Math.abs(percent)).toBeLessThan(1e-10);
	});

	it('compares only where both reach', () => {
		const short = aSeries(() => 2, { xiRadPerS: [1e15, 1e16], epsilon: [2, 2] });
		const { xiRadPerS: compared } = ratioOf(
			aSeries(() => 3),
			short
		);
		expect(Math.min(...compared)).toBeGreaterThanOrEqual(1e15 * (1 - 1e-9));
		expect(Math.max(...compared)).toBeLessThanOrEqual(1e16 * (1 + 1e-9));
		expect(largestDifference({ xiRadPerS: [], percent: [] })).toBeNull();
	});
});

describe('epsilonSeries', () => {
	it('adds what lies below and above the table', () => {
		const series = epsilonSeries(
			{
				measuredRangeEv: null,
				imaginary: {
					xiRadPerS: [1e14, 1e15],
					epsilon: [3, 2],
					shares: { below: [0.5, 0.2], inside: [0.4, 0.7], above: [0.1, 0.1] }
				}
			},
			{ slug: 'a', title: 'a', letter: 'A', ink: 1 }
		);
		expect(series.extrapolatedShare?.map((share) => Number(share.toFixed(9)))).toEqual([0.6, 0.3]);
		expect(extrapolatedShareAt(series, 1e15)).toBeCloseTo(0.3, 9);
		expect(extrapolatedShareAt({ ...series, extrapolatedShare: null }, 1e15)).toBeUndefined();
	});
});
