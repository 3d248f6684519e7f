import { describe, expect, it } from 'vitest';
import { extrapolatedRange } from './extrapolated-range.ts';
import { containing, folded, searchWords } from './search-text.ts';
import { refractiveIndex } from './spectrum.ts';

describe('refractiveIndex', () => {
	it.each([
		[2, 0],
		[0, 3],
		[1.5, 1e-9],
		[1e-9, 4],
		[0.92, 13.78],
		[0, 0]
	])('finds n = %d and k = %d again, the small one to its last digits', (n, k) => {
		const found = refractiveIndex((n - k) * (n + k), 2 * n * k);
		expect(Math.abs(found.n - n)).toBeLessThanOrEqual(4 * Number.EPSILON * n);
		expect(Math.abs(found.k - k)).toBeLessThanOrEqual(4 * Number.EPSILON * k);
	});
});

describe('extrapolatedRange', () => {
	it('spans the features of a model', () => {
		const drude = { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 } as const;
		const lorentz = { kind: 'lorentz', terms: [{ strengthEv2: 1, energyEv: 13, dampingEv: 1 }] } as const;
		expect(
			extrapolatedRange({ kind: 'sum', of: [drude, { ...lorentz, terms: [...lorentz.terms] }] })
		).toEqual({ low: 0.035, high: 13 });
	});

	it('reaches beyond a table only where an end does', () => {
		const rows = { kind: 'table' as const, energiesEv: [1, 2], epsilon2: [1, 1] };
		const none = { kind: 'none' } as const;
		expect(extrapolatedRange({ ...rows, lowEnd: none, highEnd: none })).toEqual({ low: 1, high: 2 });
		expect(
			extrapolatedRange({
				...rows,
				lowEnd: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.02 },
				highEnd: { kind: 'power', exponent: 3 }
			})
		).toEqual({ low: 0.02, high: 20 });
	});

	it('gives a single feature a width, and nothing to vacuum', () => {
		const range = extrapolatedRange({ kind: 'plasma', plasmaEnergyEv: 9 });
		expect(range && range.low < 9 && range.high > 9).toBe(true);
		expect(extrapolatedRange({ kind: 'vacuum' })).toBeNull();
	});
});

describe('search text', () => {
	it('is folded alike on both sides', () => {
		expect(folded('Rakić, Bergström Å')).toBe('rakic, bergstrom a');
		expect(searchWords('  Gold   DRUDE ')).toEqual(['gold', 'drude']);
		expect(searchWords('a b c d e f g h i j')).toHaveLength(8);
	});

	it('takes the wildcards of a pattern literally', () => {
		expect(containing('50%_\\')).toBe('%50\\%\\_\\\\%');
	});
});
