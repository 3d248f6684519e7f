import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { InvalidInput } from '../errors.ts';
import { decodeCursor, encodeCursor, page, pageSize } from './paginate.ts';

const key = z.tuple([z.string(), z.number()]);

describe('paginate', () => {
	it('gives back the key that it was given', () => {
		expect(decodeCursor(encodeCursor(['gold: Å', 3]), key)).toEqual(['gold: Å', 3]);
	});

	it.each(['', 'x', '%%%', encodeCursor({ other: true }), encodeCursor(['gold', '3'])])(
		'refuses the foreign cursor "%s"',
		(cursor) => {
			expect(() => decodeCursor(cursor, key)).toThrow(InvalidInput);
		}
	);

	it('names a next page only when a row is left over', () => {
		const full = page([1, 2, 3], 2, (row) => row);
		expect(full.rows).toEqual([1, 2]);
		expect(decodeCursor(full.next ?? '', z.number())).toBe(2);
		expect(page([1, 2], 2, (row) => row)).toEqual({ rows: [1, 2], next: null });
		expect(page([], 2, (row) => row)).toEqual({ rows: [], next: null });
	});

	it.each(['0', '201', '1.5', 'all'])('refuses the page size %s', (text) => {
		expect(pageSize.safeParse(text).success).toBe(false);
	});
});
