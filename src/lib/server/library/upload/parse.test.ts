import { describe, expect, it } from 'vitest';
import { parseSheet, type SheetOptions } from './parse.ts';
import { RefusedFile } from './refused-file.ts';

const refusal = (text: string, options?: SheetOptions) => {
	try {
		parseSheet(text, options);
	} catch (error) {
		if (error instanceof RefusedFile) return { code: error.code, ...error.issues[0] };
		throw error;
	}
	throw new Error('was accepted');
};

describe('parseSheet', () => {
	it.each([
		['commas', '1,2,3\n4,5,6', ','],
		['semicolons', '1;2;3\n4;5;6', ';'],
		['tabs', '1\t2\t3\n4\t5\t6', '\t'],
		['blanks', '1 2  3\n 4 5 6', ' ']
	])('detects %s', (_what, text, delimiter) => {
		const sheet = parseSheet(text);
		expect(sheet.delimiter).toBe(delimiter);
		expect(sheet.rows.map(({ cells }) => cells)).toEqual([
			['1', '2', '3'],
			['4', '5', '6']
		]);
	});

	it('detects decimal commas between semicolons', () => {
		expect(parseSheet('0,5;1,25\n0,6;1,5')).toMatchObject({ delimiter: ';', decimal: ',' });
	});

	it('asks rather than guesses where both readings hold', () => {
		expect(refusal('a,b,c,d\n0,5,1,2\n0,6,1,3')).toMatchObject({
			code: 'ambiguous',
			rule: 'ambiguous',
			line: 1
		});
		const told = parseSheet('0,5,1,2\n0,6,1,3', { delimiter: ',', decimal: '.' });
		expect(told.rows[0].cells).toEqual(['0', '5', '1', '2']);
	});

	it.each(['0,5,1,2.5\n0,6,1,3', '500,2\n400,3', '1,2,3\n4,5,6', '0,-5,1,2\n0,-6,1,3'])(
		'does not ask about %j, which reads one way only',
		(text) => {
			expect(parseSheet(text)).toMatchObject({ delimiter: ',', decimal: '.' });
		}
	);

	it('reads decimal commas between blanks', () => {
		expect(parseSheet('0,5 1,2\n0,6 1,3')).toMatchObject({ delimiter: ' ', decimal: ',' });
	});

	it('keeps line numbers across comments, blank lines, headings and skipped rows', () => {
		const text = 'junk that is skipped\n# a comment\n\nenergy,n\neV,1\n1.5,2\n% another\n2.5,3\n';
		const sheet = parseSheet(text, { skipRows: 1 });
		expect(sheet.headings.map(({ line }) => line)).toEqual([4, 5]);
		expect(sheet.rows.map(({ line }) => line)).toEqual([6, 8]);
		expect(sheet.comments).toEqual(['# a comment', '% another']);
	});

	it('takes a units row of words for a heading', () => {
		const sheet = parseSheet('energy,n\neV,(none)\n1.5,2\n2,3\n');
		expect(sheet.headings.map(({ cells }) => cells)).toEqual([
			['energy', 'n'],
			['eV', '(none)']
		]);
	});

	it('takes a units row in which some units are one for a heading', () => {
		const sheet = parseSheet('wavelength;n;k\nnm;1;1\n600,5;0,2;3\n550;0,3;2\n');
		expect(sheet).toMatchObject({ delimiter: ';', decimal: ',' });
		expect(sheet.headings.map(({ line }) => line)).toEqual([1, 2]);
		expect(parseSheet('eV,1\n1.5,2\n2,3\n').rows).toHaveLength(2);
	});

	it('reads a file with a slip in it as what most of its lines are', () => {
		const sheet = parseSheet('600;0,2;3\n550;x;2,7\n500;0,8;1\n');
		expect(sheet).toMatchObject({ delimiter: ';', decimal: ',' });
		expect(sheet.rows).toHaveLength(3);
	});

	it('honours quotes and refuses one left open', () => {
		expect(parseSheet('"1","2"\n"3","4"', { delimiter: ',', decimal: '.' }).rows[1].cells).toEqual([
			'3',
			'4'
		]);
		expect(refusal('1,2\n"3,4', { delimiter: ',', decimal: '.' })).toMatchObject({ rule: 'quotes', line: 2 });
	});

	it.each([
		['', 'empty'],
		['# only\n# comments\n', 'empty'],
		['words only\nno numbers here\n', 'empty'],
		['1,2\n3\n', 'width'],
		['1,2\n3,4,5\n', 'width'],
		[`${'a,b\n'.repeat(20)}1,2\n3,4\n`, 'heading']
	])('refuses %j by its rule', (text, rule) => {
		expect(refusal(text, { delimiter: ',', decimal: '.' }).rule).toBe(rule);
	});

	it('refuses more rows than are taken', () => {
		const text = Array.from({ length: 20_001 }, (_, index) => `${index + 1},2`).join('\n');
		expect(refusal(text)).toMatchObject({ rule: 'rows', line: 20_001 });
	});

	it('names every line of the wrong width, up to a hundred', () => {
		const text = `1,2\n${'3\n'.repeat(300)}`;
		try {
			parseSheet(text, { delimiter: ',', decimal: '.' });
			expect.unreachable();
		} catch (error) {
			expect(error instanceof RefusedFile && error.issues.length).toBe(100);
		}
	});
});
