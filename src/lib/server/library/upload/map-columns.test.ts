import { describe, expect, it } from 'vitest';
import type { TableReading } from '../../../schemas/upload.ts';
import { InvalidInput } from '../../errors.ts';
import { mapColumns } from './map-columns.ts';
import { parseSheet } from './parse.ts';
import { RefusedFile } from './refused-file.ts';

const READING: TableReading = {
	skipRows: 0,
	abscissa: { column: 1, unit: 'eV' },
	ordinates: [
		{ column: 2, quantity: 'n' },
		{ column: 3, quantity: 'k' }
	],
	duplicates: 'refuse',
	lowEnd: { kind: 'none' },
	highEnd: { kind: 'none' }
};

const map = (text: string, change: Partial<TableReading> = {}) =>
	mapColumns(parseSheet(text, { delimiter: ',', decimal: '.' }), { ...READING, ...change });

const issues = (text: string, change: Partial<TableReading> = {}) => {
	try {
		map(text, change);
	} catch (error) {
		if (error instanceof RefusedFile)
			return error.issues.map(({ line, column, rule }) => [line, column, rule]);
		throw error;
	}
	return [];
};

describe('mapColumns', () => {
	it('turns n and k into a permittivity', () => {
		const { model, rows } = map('1,2,1\n2,3,0.5\n');
		expect(model).toMatchObject({ kind: 'table', energiesEv: [1, 2], epsilon2: [4, 3] });
		expect(rows?.epsilon1).toEqual([3, 8.75]);
	});

	// hc/e = 1.239841984 eV um by the exact constants; 1 eV/h = 2.417989242e14 Hz; 8065.543937 cm^-1 to 1 eV.
	it.each([
		['nm', '1239.841984,1,1\n619.920992,1,1\n'],
		['um', '1.239841984,1,1\n0.619920992,1,1\n'],
		['cm^-1', '8065.543937,1,1\n16131.087874,1,1\n'],
		['Hz', '2.417989242e14,1,1\n4.835978484e14,1,1\n'],
		['rad/s', '1.519267447e15,1,1\n3.038534894e15,1,1\n']
	] as const)('reads an abscissa in %s, ascending in energy whatever way the file runs', (unit, text) => {
		const { measuredRangeEv } = map(text, { abscissa: { column: 1, unit } });
		expect(Math.abs(measuredRangeEv.low - 1)).toBeLessThan(1e-9);
		expect(Math.abs(measuredRangeEv.high - 2)).toBeLessThan(2e-9);
	});

	it('keeps the numbers as given, in the order of the file', () => {
		const { given } = map('500,2,1\n400,3,0\n', { abscissa: { column: 1, unit: 'nm' } });
		expect(given).toEqual({
			abscissaUnit: 'nm',
			quantities: ['n', 'k'],
			abscissa: [500, 400],
			ordinates: [
				[2, 3],
				[1, 0]
			]
		});
	});

	it("takes eps' and eps'', eps'' alone, and eps(i xi)", () => {
		const both = map('1,-5,2\n2,-1,1\n', {
			ordinates: [
				{ column: 3, quantity: 'epsilon2' },
				{ column: 2, quantity: 'epsilon1' }
			]
		});
		expect(both.rows).toEqual({ energiesEv: [1, 2], epsilon1: [-5, -1], epsilon2: [2, 1] });
		const alone = map('1,2\n2,1\n', { ordinates: [{ column: 2, quantity: 'epsilon2' }] });
		expect(alone.rows).toEqual({ energiesEv: [1, 2], epsilon1: null, epsilon2: [2, 1] });
		const imaginary = map('1e14,5\n1e15,2\n', {
			abscissa: { column: 1, unit: 'rad/s' },
			ordinates: [{ column: 2, quantity: 'epsilonImaginary' }]
		});
		expect(imaginary.model).toEqual({
			kind: 'imaginaryTable',
			frequenciesRadPerS: [1e14, 1e15],
			epsilon: [5, 2]
		});
		expect(imaginary.rows).toBeNull();
	});

	it.each([
		['a word', '1,2,1\n2,x,1\n', [[2, 2, 'number']]],
		['an empty cell', '1,2,1\n2,3,\n', [[2, 3, 'number']]],
		['a negative k', '1,2,1\n2,3,-1\n', [[2, 3, 'passivity']]],
		['a negative n', '1,-2,1\n2,3,1\n', [[1, 2, 'passivity']]],
		['an abscissa of zero', '0,2,1\n2,3,1\n', [[1, 1, 'abscissa']]],
		['a turn', '1,2,1\n3,2,1\n2,2,1\n4,2,1\n', [[3, null, 'order']]],
		['a repeated abscissa', '1,2,1\n1,2,1\n2,2,1\n', [[2, null, 'duplicate']]],
		[
			'two wrong lines',
			'1,2,1\nx,2,1\n2,2,y\n',
			[
				[2, 1, 'number'],
				[3, 3, 'number']
			]
		],
		['a single row', '1,2,1\n', [[1, null, 'rows']]]
	])('refuses %s and names the place', (_what, text, expected) => {
		expect(issues(text)).toEqual(expected);
	});

	it('merges repeated rows only when told and only when equal', () => {
		expect(issues('1,2,1\n1,2,1\n2,2,1\n', { duplicates: 'merge-equal' })).toEqual([]);
		expect(issues('1,2,1\n1,2,2\n2,2,1\n', { duplicates: 'merge-equal' })).toEqual([[2, null, 'duplicate']]);
	});

	it('refuses a column that the file does not have', () => {
		const ordinates = [
			{ column: 2, quantity: 'n' as const },
			{ column: 4, quantity: 'k' as const }
		];
		expect(issues('1,2,1\n2,2,1\n', { ordinates })).toEqual([
			[1, 4, 'width'],
			[2, 4, 'width']
		]);
	});

	it.each([
		['n alone', [{ column: 2, quantity: 'n' as const }]],
		[
			'n and eps2',
			[
				{ column: 2, quantity: 'n' as const },
				{ column: 3, quantity: 'epsilon2' as const }
			]
		],
		[
			'n twice',
			[
				{ column: 2, quantity: 'n' as const },
				{ column: 3, quantity: 'n' as const }
			]
		],
		[
			'one column twice',
			[
				{ column: 2, quantity: 'n' as const },
				{ column: 2, quantity: 'k' as const }
			]
		]
	])('refuses a reading by %s', (_what, ordinates) => {
		expect(() => map('1,2,1\n2,2,1\n', { ordinates })).toThrow(InvalidInput);
	});
});
