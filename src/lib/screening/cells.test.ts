import { describe, expect, it } from 'vitest';
import type { ScreeningPlan } from '../schemas/screening.ts';
import { cellAt, cellsIn, evaluationsIn, indexOf, pairsIn } from './cells.ts';

const part = (of: number) => ({ group: of, of, reference: true });
const plan = (left: number, media: number, right: number | null): ScreeningPlan => ({
	materials: [],
	left: Array.from({ length: left }, (_, index) => part(index)),
	media: Array.from({ length: media }, (_, index) => part(index)),
	right: Array.from({ length: right ?? left }, (_, index) => part(index)),
	symmetric: right === null,
	temperaturesK: [300, 77, 0],
	rules: ['drude', 'plasma'],
	separationsNm: [10, 100],
	relativeAccuracy: 1e-6
});

describe('cells', () => {
	it.each([
		['unordered pairs', plan(40, 3, null)],
		['ordered pairs', plan(7, 3, 11)]
	])('are numbered one to one, %s', (_, one) => {
		const total = cellsIn(one);
		expect(evaluationsIn(one)).toBe(2 * total);
		const seen = new Set<string>();
		for (let index = 0; index < total; index += 1) {
			const cell = cellAt(one, index);
			expect(indexOf(one, cell)).toBe(index);
			expect(indexOf(one, one.symmetric ? { ...cell, left: cell.right, right: cell.left } : cell)).toBe(
				index
			);
			seen.add(JSON.stringify(cell));
		}
		expect(seen.size).toBe(total);
	});

	it('count 8 200 triples of 40 bodies and 10 media', () => {
		const one = { ...plan(40, 10, null), temperaturesK: [300], rules: ['written' as const] };
		expect(pairsIn(one)).toBe(820);
		expect(cellsIn(one)).toBe(8200);
	});

	it('find the row of the last pair of a long triangle', () => {
		const one = { ...plan(1, 1, null), temperaturesK: [300], rules: ['written' as const] };
		const long = { ...one, left: Array.from({ length: 2000 }, (_, index) => part(index)) };
		const last = cellsIn(long) - 1;
		expect(cellAt(long, last)).toMatchObject({ left: 1999, right: 1999 });
		expect(cellAt(long, last - 1999)).toMatchObject({ left: 1999, right: 0 });
		expect(cellAt(long, last - 2000)).toMatchObject({ left: 1998, right: 1998 });
	});
});
