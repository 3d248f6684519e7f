import { describe, expect, it } from 'vitest';
import { bandPath, linePath, magnitudeAxis, magnitudePaths, spreadLabels } from './curve-data.ts';
import { logScale } from './log-scale.ts';

const x = logScale([1, 1000], [0, 300]);
const series = (values: number[], met = values.map(() => true)) => ({
	separationsNm: [1, 10, 100, 1000].slice(0, values.length),
	values,
	bounds: values.map(() => 1e-9),
	met
});

describe('magnitude strip', () => {
	it('spans whole decades around all values', () => {
		const axis = magnitudeAxis([series([-350, -2]), series([0.02])], 0, 200);
		expect([axis.low, axis.high]).toEqual([-2, 3]);
		expect(axis.at(1000)).toBe(0);
		expect(axis.at(0.01)).toBe(200);
	});

	it('labels fewer decades where there is little room', () => {
		expect(magnitudeAxis([series([1e8, 1e-8])], 0, 400).labels).toHaveLength(17);
		expect(magnitudeAxis([series([1e8, 1e-8])], 0, 100).labels.length).toBeLessThan(6);
	});

	it('stands without any value, and does not follow a zero crossing down without end', () => {
		expect(magnitudeAxis([], 0, 100)).toMatchObject({ low: -2, high: 0 });
		expect(magnitudeAxis([series([1, 1e-200])], 0, 100)).toMatchObject({ low: -30, high: 0 });
	});

	it('does not follow the values beside a change of sign', () => {
		expect(magnitudeAxis([series([-100, -1e-9, 10, 100])], 0, 100)).toMatchObject({ low: 0, high: 2 });
	});

	it('breaks the line where the sign changes', () => {
		const y = magnitudeAxis([series([-100, -10, 10, 100])], 0, 100);
		expect(magnitudePaths(series([-100, -10, 10, 100]), x, y)).toEqual({
			attracts: 'M0.0 0.0L100.0 50.0',
			repels: 'M200.0 50.0L300.0 0.0',
			unmet: ''
		});
	});

	it('marks points whose accuracy was not reached', () => {
		const y = magnitudeAxis([series([-100, -1])], 0, 100);
		expect(magnitudePaths(series([-100, -10, -1], [true, false, false]), x, y).unmet).toBe(
			'M100.0 50.0L200.0 100.0'
		);
	});
});

describe('bands', () => {
	it('run around the curve, along the ends of the axis where they leave it', () => {
		const y = magnitudeAxis([series([-100, -1])], 0, 100);
		const band = { separationsNm: [10, 100], low: [10, 0], high: [1000, 10] };
		expect(bandPath(band, x, y)).toBe('M100.0 0.0L200.0 50.0L200.0 100.0L100.0 50.0Z');
	});
});

describe('plain lines', () => {
	it('hold values at the limits and break at holes', () => {
		const path = linePath([1, 10, 100, 1000], [0.5, undefined, 3, 0], x, (value) => 10 * value, [0, 1]);
		expect(path).toBe('M0.0 5.0M200.0 10.0L300.0 0.0');
	});
});

describe('labels at line ends', () => {
	it('keep their places where there is room', () => {
		expect(spreadLabels([10, 90, 50], 14, 0, 100)).toEqual([10, 90, 50]);
	});

	it('move apart, in their order, and stay inside', () => {
		expect(spreadLabels([98, 97, 99], 10, 0, 100)).toEqual([90, 80, 100]);
		expect(spreadLabels([1, 1], 10, 0, 100)).toEqual([1, 11]);
	});
});
