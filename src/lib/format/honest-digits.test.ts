import { describe, expect, it } from 'vitest';
import { figuresLeft, honestNumber } from './honest-digits.ts';
import { PRESSURE } from './quantity.ts';

const MINUS = '\u2212';

describe('honest digits', () => {
	it.each([
		[1.2, 1],
		[0.15, 2],
		[0.1, 2],
		[0.011, 3],
		[0.001, 4]
	])('a spread of %f leaves %i figures', (spread, figures) => {
		expect(figuresLeft(spread)).toBe(figures);
	});

	it.each([
		[-5.632, 1e-9, 0.15, `${MINUS}5.6`, '32', 'Pa'],
		[-5.632, 1e-9, null, `${MINUS}5.632`, '', 'Pa'],
		[-5.632, 1e-9, 1.2, `${MINUS}5`, '.632', 'Pa'],
		[2.43, 1e-2, null, '2.4', '', 'Pa'],
		[0.04567, 1e-9, 0.02, '45.6', '7', 'mPa'],
		[123.4, 1e-9, 1.2, '1', '23.4', 'Pa'],
		[0, 0, null, '0', '', 'pPa']
	])('writes %d with bound %d and spread %d', (value, bound, spread, supported, certified, unit) => {
		expect(honestNumber(value, PRESSURE, bound, spread)).toEqual({
			supported,
			certified,
			unit,
			exponent: null
		});
	});

	it('keeps a power of ten beside the digits where the unit is fixed', () => {
		const written = honestNumber(1.234e-9, [{ symbol: 'Pa', size: 1 }], 1e-9, 0.1);
		expect(written).toEqual({ supported: '1.2', certified: '34', exponent: -9, unit: 'Pa' });
	});

	it('shows no digit where the bound leaves none beyond the first', () => {
		expect(honestNumber(2.43, PRESSURE, 0.6, null)).toMatchObject({ supported: '2', certified: '' });
	});
});
