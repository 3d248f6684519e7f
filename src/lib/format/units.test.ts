import { describe, expect, it } from 'vitest';
import { quantityLine } from './quantity.ts';
import { axisUnit, readUnitChoices, scaleFor } from './units.ts';

describe('units that a reader fixes', () => {
	it('writes a number in the fixed unit and else in the fitting one', () => {
		expect(quantityLine(2430, scaleFor('pressure', {}))).toBe('2.43 kPa');
		expect(quantityLine(2430, scaleFor('pressure', { pressure: 'Pa' }))).toBe('2430 Pa');
		expect(quantityLine(38, scaleFor('length', { length: 'Å' }))).toBe('380 Å');
		expect(quantityLine(0.3, scaleFor('length', {}))).toBe('0.300 nm');
	});

	it('gives an axis one unit', () => {
		expect(axisUnit('pressure', {})).toEqual({ symbol: 'Pa', size: 1 });
		expect(axisUnit('pressure', { pressure: 'kPa' })).toEqual({ symbol: 'kPa', size: 1e3 });
	});

	it.each([
		[null, {}],
		['not json', {}],
		['{"pressure":"psi","length":"µm","shoe":"42"}', { length: 'µm' }]
	])('reads stored choices %s', (text, expected) => {
		expect(readUnitChoices(text)).toEqual(expected);
	});
});
