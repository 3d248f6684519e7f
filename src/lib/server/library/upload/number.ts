/** The one grammar of numbers in uploaded files. Anything else is refused with a word on why. */

export type NumberReading = { value: number } | { rule: string; message: string };

const POINT = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d{1,4})?$/;
const COMMA = /^[+-]?(\d+,?\d*|,\d+)([eE][+-]?\d{1,4})?$/;

/** A numeral whose digits are all zero; only such a text may read as 0. */
const ZERO = /^[+-]?[0.]+([eE][+-]?\d+)?$/;

export function readNumber(text: string, decimal: '.' | ','): NumberReading {
	const trimmed = text.trim();
	if (!(decimal === '.' ? POINT : COMMA).test(trimmed))
		return { rule: 'number', message: whyNot(trimmed, decimal) };
	const plain = decimal === ',' ? trimmed.replace(',', '.') : trimmed;
	const value = Number(plain);
	if (!Number.isFinite(value)) return { rule: 'range', message: 'the number is too large to be kept' };
	if (value === 0 && !ZERO.test(plain))
		return { rule: 'range', message: 'the number is too small to be kept' };
	// -0 carries no information here and would spoil comparisons.
	return { value: value === 0 ? 0 : value };
}

function whyNot(text: string, decimal: '.' | ','): string {
	if (text === '') return 'a number is missing';
	if (/[−–‒]/.test(text)) return 'the minus is a typographic dash; write the hyphen-minus of the keyboard';
	if (/^[+-]?0x/i.test(text)) return 'hexadecimal numbers are not read';
	if (/^[+-]?(nan|inf(inity)?)$/i.test(text)) return 'NaN and infinities are not data; leave the row out';
	if (/\d[dD][+-]?\d/.test(text)) return 'write the exponent with e, as 1.5e3';
	if (decimal === '.' && COMMA.test(text)) return 'a decimal comma where decimal points were expected';
	if (decimal === ',' && POINT.test(text)) return 'a decimal point where decimal commas were expected';
	return 'this is not a number';
}
