import { describe, expect, it } from 'vitest';
import { decodeStudy } from './study-address.ts';
import { WORKED_ARRANGEMENTS } from './worked-arrangements.ts';

describe('a worked arrangement', () => {
	it.each(WORKED_ARRANGEMENTS.map(({ name, query }) => [name, query] as const))(
		'reads whole: %s',
		(_name, query) => {
			expect(decodeStudy(new URLSearchParams(query)).problems).toEqual([]);
		}
	);

	it('has a name of its own', () => {
		expect(new Set(WORKED_ARRANGEMENTS.map(({ name }) => name)).size).toBe(WORKED_ARRANGEMENTS.length);
	});
});
