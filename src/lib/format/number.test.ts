import { describe, expect, it } from 'vitest';
import { MINUS, numberLine, numberText, percent } from './number.ts';

describe('numbers on the page', () => {
	it.each([
		[0, 3, '0', null],
		[-2.4349, 3, `${MINUS}2.43`, null],
		[38, 3, '38.0', null],
		[999.96, 4, '1000', null],
		[12345.6, 3, '12\u202f300', null],
		[0.00123, 3, '0.00123', null],
		[1e-9, 2, '1.0', -9],
		[-9.996e7, 3, `${MINUS}1.00`, 8]
	])('shows %d with %d figures as %s', (value, digits, mantissa, exponent) => {
		expect(numberText(value, digits)).toEqual({ mantissa, exponent });
	});

	it('speaks a power of ten on one line', () => {
		expect(numberLine(-2.5e-9, 2)).toBe(`${MINUS}2.5 × 10^${MINUS}9`);
	});

	it('shows a share in per cent with its sign where asked', () => {
		expect(percent(0.0214, { signed: true, digits: 3 })).toBe('+2.14 %');
		expect(percent(-0.5)).toBe(`${MINUS}50 %`);
	});
});
