import { describe, expect, it } from 'vitest';
import { epsilonAxis, percentAxis } from './epsilon-axis.ts';

const named = (largest: number) =>
	epsilonAxis([[largest, 1]], 0, 300)
		.ticks.filter((tick) => tick.labelled)
		.map((tick) => tick.label)
		.sort((a, b) => Number(a) - Number(b));

describe('epsilonAxis', () => {
	it('has 1 at the foot and leaves room above the largest value', () => {
		const axis = epsilonAxis([[80, 1.5]], 10, 300);
		expect(axis.at(1)).toBe(300);
		expect(axis.at(80)).toBeGreaterThan(10);
		expect(axis.at(0.5)).toBe(300);
	});

	it('names the steps between decades for a material without a decade of its own', () => {
		expect(named(5.4)).toEqual(['1', '2', '3', '5']);
		expect(named(80)).toEqual(['1', '10']);
	});

	it('names decades only for a metal, every other one when they are many', () => {
		expect(named(3e4)).toEqual(['1', '10', '100', '1000', '10000']);
		expect(named(3e7)).toEqual(['1', '100', '10000', '1000000']);
	});

	it('survives values that are no numbers', () => {
		expect(epsilonAxis([[Number.POSITIVE_INFINITY, Number.NaN, 3]], 0, 300).at(3)).toBeGreaterThan(0);
	});
});

describe('percentAxis', () => {
	it.each([
		[[3.2, -1], 5],
		[[0.013], 0.02],
		[[-100], 100],
		[[0, 0], 1],
		[[], 1],
		[[612], 1000]
	])('holds %j inside ±%d', (values, limit) => {
		const axis = percentAxis(values);
		expect(axis.limit).toBeCloseTo(limit, 12);
		expect(axis.ticks).toContain(0);
		expect(axis.ticks.at(-1)).toBeCloseTo(limit, 12);
	});
});
