import { describe, expect, it } from 'vitest';
import { pointColumns, shownRange, splitAtRange, valueRange, type RealSeries } from './real-axis-data.ts';
import { realAxisFigure, type FigureTheme } from './real-axis-figure.ts';
import { signedLog, signedTicks } from './signed-log.ts';

const energyEv = [0.1, 0.2, 0.5, 1, 2, 5, 10, 20];

function aSeries(over: Partial<RealSeries> = {}): RealSeries {
	return {
		slug: 'gold-a',
		title: 'Gold a',
		letter: 'A',
		ink: 2,
		measuredRangeEv: { low: 0.5, high: 5 },
		real: {
			energyEv,
			n: energyEv.map((energy) => 1 / energy),
			k: energyEv.map((energy) => 10 / energy),
			epsilon1: energyEv.map((energy) => 1 - 81 / energy ** 2),
			epsilon2: energyEv.map((energy) => 2 / energy ** 3)
		},
		points: null,
		...over
	};
}

describe('splitAtRange', () => {
	it('cuts at the measured range and repeats the points at the cuts', () => {
		const { measured, below, above } = splitAtRange(aSeries(), 'n');
		expect(measured.energyEv).toEqual([0.5, 1, 2, 5]);
		expect(below.energyEv).toEqual([0.1, 0.2, 0.5]);
		expect(above.energyEv).toEqual([5, 10, 20]);
		expect(above.values[0]).toBe(measured.values[3]);
	});

	it('knows curves that are measured throughout, not at all, or beside the samples', () => {
		const throughout = splitAtRange(aSeries({ measuredRangeEv: { low: 0.01, high: 100 } }), 'k');
		expect(throughout.measured.energyEv).toEqual(energyEv);
		expect(throughout.below.energyEv).toEqual([]);
		expect(throughout.above.energyEv).toEqual([]);
		for (const measuredRangeEv of [null, { low: 100, high: 200 }, { low: 0.6, high: 0.7 }]) {
			const parts = splitAtRange(aSeries({ measuredRangeEv }), 'k');
			expect(parts.measured.energyEv).toEqual([]);
			expect(parts.below.energyEv).toEqual(energyEv);
		}
	});
});

describe('what is shown', () => {
	it('holds the measured ranges with a margin, inside the samples', () => {
		expect(shownRange([aSeries()])).toEqual({ low: 0.1, high: 20 });
		expect(shownRange([aSeries({ measuredRangeEv: null })])).toEqual({ low: 0.1, high: 20 });
		expect(shownRange([])).toEqual({ low: 0.01, high: 100 });
	});

	it('finds the values inside the range only', () => {
		expect(valueRange([aSeries()], 'n', { low: 0.5, high: 2 })).toEqual({ low: 0.5, high: 2 });
		expect(valueRange([aSeries()], 'n', { low: 50, high: 60 })).toBeNull();
	});

	it('gives measured points only of quantities that the file had', () => {
		const points = { energyEv: [1, 2], epsilon1: null, epsilon2: [3, 4], n: null, k: null };
		expect(pointColumns(aSeries({ points }), 'epsilon2')).toEqual({ energyEv: [1, 2], values: [3, 4] });
		expect(pointColumns(aSeries({ points }), 'n')).toBeNull();
		expect(pointColumns(aSeries(), 'n')).toBeNull();
	});
});

describe('signedLog', () => {
	it('is odd, goes through zero and counts decades far out', () => {
		expect(signedLog(0)).toBe(0);
		expect(signedLog(-50)).toBe(-signedLog(50));
		expect(signedLog(1e6) - signedLog(1e5)).toBeCloseTo(1, 4);
	});

	it('has ticks in order, on both sides where the values are', () => {
		const ticks = signedTicks(-8000, 12);
		expect(ticks.map((tick) => tick.text)).toEqual(['−10<sup>3</sup>', '−100', '−10', '−1', '0', '1', '10']);
		const places = ticks.map((tick) => tick.at);
		expect([...places].sort((a, b) => a - b)).toEqual(places);
	});
});

describe('realAxisFigure', () => {
	const theme: FigureTheme = {
		ink: '#000001',
		muted: '#000002',
		edge: '#000003',
		rule: '#000004',
		page: '#000005',
		series: ['#000011', '#000012', '#000013', '#000014', '#000015']
	};
	const size = { width: 700, height: 460 };
	const figure = (panels: 'nk' | 'epsilon', abscissa: 'energy' | 'wavelength') =>
		realAxisFigure(
			[aSeries(), aSeries({ slug: 'gold-b', letter: 'B', ink: 3 })],
			panels,
			abscissa,
			theme,
			size
		);

	it('uses no colour but the tokens', () => {
		const colours = JSON.stringify(figure('nk', 'energy')).match(/#[0-9a-f]{3,8}\b/gi) ?? [];
		expect(colours.length).toBeGreaterThan(0);
		for (const colour of colours) expect(colour).toMatch(/^#0000/);
	});

	it('labels each curve once a panel at the line end, apart from each other', () => {
		const annotations = figure('nk', 'energy').layout.annotations ?? [];
		expect(annotations.map((annotation) => annotation.text)).toEqual([
			'<b>A</b>',
			'<b>B</b>',
			'<b>A</b>',
			'<b>B</b>'
		]);
		expect(Math.abs(Number(annotations[0].y) - Number(annotations[1].y))).toBeGreaterThan(0.03);
	});

	it('turns the axis round for wavelengths and keeps it ascending', () => {
		const [low, high] = figure('epsilon', 'wavelength').layout.xaxis?.range as [number, number];
		expect(low).toBeLessThan(high);
		expect(10 ** high).toBeCloseTo(1.239841984 / 0.1, 5);
	});

	it('draws the extrapolated parts dashed and the measured part solid', () => {
		const dashes = figure('nk', 'energy').data.map((trace) => {
			const line = 'line' in trace ? trace.line : undefined;
			return line !== undefined && 'dash' in line ? line.dash : undefined;
		});
		expect(dashes.filter((dash) => dash === 'dot')).toHaveLength(8);
		expect(dashes.filter((dash) => dash === undefined)).toHaveLength(4);
	});
});
