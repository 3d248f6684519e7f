import { describe, expect, it } from 'vitest';
import { lengthText, parseLengthNm, parseNumber } from './length.ts';

describe('typed lengths', () => {
	it.each([
		['20', 20],
		['20 nm', 20],
		['0,5 µm', 500],
		['0.02um', 20],
		['12 Å', 1.2],
		['1e3', 1000],
		['2 mm', 2e6],
		['', undefined],
		['-3', undefined],
		['ten', undefined],
		['5 km', undefined],
		['1,234,5', undefined]
	])('"%s" is %s nm', (text, nm) => {
		expect(parseLengthNm(text)).toBe(nm);
	});

	it.each([0.3, 20, 999.5, 1000, 12345.678, 1e6])('%d nm is read back from its own text', (nm) => {
		expect(parseLengthNm(lengthText(nm))).toBe(nm);
	});

	it('numbers take a point or a comma', () => {
		expect([parseNumber('293.15'), parseNumber('293,15'), parseNumber('300 K')]).toEqual([
			293.15,
			293.15,
			undefined
		]);
	});
});
