import { describe, expect, it } from 'vitest';
import { PRESSURE, SEPARATION, quantityLine, quantityText, signWord } from './quantity.ts';
import { MINUS } from './number.ts';

describe('quantities with a unit for the reader', () => {
	it.each([
		[38, '38.0 nm'],
		[999.9, '1.00 µm'],
		[0.5, '0.500 nm'],
		[7632.9, '7.63 µm']
	])('shows %d nm as %s', (value, text) => {
		expect(quantityLine(value, SEPARATION)).toBe(text);
	});

	it('keeps the sign and picks mPa below one pascal', () => {
		expect(quantityText(-0.004831, PRESSURE)).toEqual({
			mantissa: `${MINUS}4.83`,
			exponent: null,
			unit: 'mPa'
		});
	});

	it('names attraction, repulsion and neither', () => {
		expect([-1, 1, 0].map(signWord)).toEqual(['attraction', 'repulsion', 'no force']);
	});
});
