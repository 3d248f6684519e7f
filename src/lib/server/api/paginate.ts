import { z } from 'zod';
import { InvalidInput } from '../errors.ts';

/** Paging by cursor: the sort key of the last row seen, opaque to the caller. */

export const PAGE_SIZE = 50;
export const PAGE_SIZE_MAX = 200;

export const pageSize = z.coerce
	.number({ error: `limit must be a whole number from 1 to ${PAGE_SIZE_MAX}` })
	.int(`limit must be a whole number from 1 to ${PAGE_SIZE_MAX}`)
	.min(1, 'limit must be at least 1')
	.max(PAGE_SIZE_MAX, `limit must be at most ${PAGE_SIZE_MAX}`)
	.default(PAGE_SIZE);

export function encodeCursor(key: unknown): string {
	return Buffer.from(JSON.stringify(key), 'utf8').toString('base64url');
}

/** @throws InvalidInput for a cursor that this list did not give out */
export function decodeCursor<T>(cursor: string, key: z.ZodType<T>): T {
	const parsed = key.safeParse(parseQuietly(Buffer.from(cursor, 'base64url').toString('utf8')));
	if (parsed.success) return parsed.data;
	throw new InvalidInput('The cursor is not one that this list gave out.', [
		{ path: 'cursor', message: 'take the value of "next" of the page before, unchanged, or leave it out' }
	]);
}

function parseQuietly(text: string): unknown {
	try {
		return JSON.parse(text);
	} catch {
		return undefined;
	}
}

/** Cuts a list that was read one longer than the page, and says where the next page begins. */
export function page<Row>(
	rows: readonly Row[],
	limit: number,
	keyOf: (row: Row) => unknown
): { rows: Row[]; next: string | null } {
	const shown = rows.slice(0, limit);
	const last = shown.at(-1);
	return { rows: shown, next: rows.length > limit && last !== undefined ? encodeCursor(keyOf(last)) : null };
}
