import { describe, expect, it } from 'vitest';
import { readNumber } from './number.ts';

const value = (text: string, decimal: '.' | ',' = '.') => {
	const read = readNumber(text, decimal);
	return 'value' in read ? read.value : read.rule;
};

describe('readNumber', () => {
	it.each([
		['1', 1],
		['+1.5', 1.5],
		['-0.25', -0.25],
		['.5', 0.5],
		['5.', 5],
		['1e3', 1000],
		['1.5E-07', 1.5e-7],
		[' 2.5 ', 2.5],
		['0', 0],
		['0.000e5', 0],
		['1.7976931348623157e308', 1.7976931348623157e308],
		['5e-324', 5e-324]
	])('takes %j', (text, expected) => {
		expect(value(text)).toBe(expected);
	});

	it('has no negative zero', () => {
		expect(Object.is(value('-0.0'), 0)).toBe(true);
	});

	it.each([
		['', /missing/],
		[' ', /missing/],
		['0x1F', /hexadecimal/],
		['NaN', /NaN/],
		['-Infinity', /infinities/],
		['inf', /infinities/],
		['−5', /dash/],
		['–5', /dash/],
		['1.5d3', /exponent with e/],
		['1,5', /decimal comma/],
		['1.234.567', /not a number/],
		['1 000', /not a number/],
		['1e', /not a number/],
		['e5', /not a number/],
		['.', /not a number/],
		['1_000', /not a number/],
		['12abc', /not a number/],
		['٣', /not a number/],
		['1e5.5', /not a number/],
		['--1', /not a number/]
	])('refuses %j and says why', (text, why) => {
		const read = readNumber(text, '.');
		expect('message' in read && read.message).toMatch(why);
	});

	it.each(['1e309', '-1e400', '1e9999'])('refuses %s, which would become infinite', (text) => {
		expect(value(text)).toBe('range');
	});

	it.each(['1e-400', '0.000001e-330'])('refuses %s, which would silently become zero', (text) => {
		expect(value(text)).toBe('range');
	});

	it.each([
		['1,5', 1.5],
		['-,25', -0.25],
		['1,5e3', 1500],
		['7', 7]
	])('takes %j under decimal commas', (text, expected) => {
		expect(value(text, ',')).toBe(expected);
	});

	it('refuses a decimal point under decimal commas', () => {
		expect(readNumber('1.5', ',')).toMatchObject({ message: expect.stringContaining('decimal point') });
	});
});
