import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { coarseToFine } from './order.ts';

describe('coarseToFine', () => {
	it('names every point once', () => {
		fc.assert(
			fc.property(fc.integer({ min: 0, max: 2100 }), (count) => {
				const { order } = coarseToFine(count);
				expect([...order].sort((a, b) => a - b)).toEqual(Array.from({ length: count }, (_, index) => index));
			})
		);
	});

	it('begins with a spread-out handful that reaches both ends', () => {
		const { order, overview } = coarseToFine(2000);
		const first = order.slice(0, overview);
		expect(overview).toBeLessThan(64);
		expect(first).toContain(0);
		expect(first).toContain(1999);
		const gaps = first.slice(1).map((index, position) => index - first[position]);
		expect(Math.max(...gaps)).toBeLessThan(2000 / 20);
	});

	it('computes a short curve in its own order', () => {
		expect(coarseToFine(5)).toEqual({ order: [0, 1, 2, 3, 4], overview: 5 });
	});
});
