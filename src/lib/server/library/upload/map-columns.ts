import type { PermittivityModel } from '../../../engine/contract.ts';
import type { FileIssue } from '../../../schemas/upload-preview.ts';
import type { Ordinate, Quantity, TableReading } from '../../../schemas/upload.ts';
import { InvalidInput } from '../../errors.ts';
import { readNumber } from './number.ts';
import { joinTables } from './join-tables.ts';
import type { Sheet } from './parse.ts';
import { PHOTON_ENERGY_EV, angularFrequency } from './photon-energy.ts';
import { RefusedFile } from './refused-file.ts';

/** A sheet with its columns understood: the numbers as given, and the model that the engine computes with. */
export interface MappedTable {
	model: PermittivityModel;
	/** In the order of the file. */
	given: { abscissaUnit: string; quantities: Quantity[]; abscissa: number[]; ordinates: number[][] };
	/** Stated uncertainties, row by row as given; empty where the file has none. */
	uncertainties: { quantity: Quantity; values: number[] }[];
	/** Over ascending photon energies; eps' only where the table has it. */
	rows: { energiesEv: number[]; epsilon1: number[] | null; epsilon2: number[] } | null;
	measuredRangeEv: { low: number; high: number };
}

interface Row {
	line: number;
	abscissa: number;
	ordinates: number[];
	uncertainties: number[];
}

interface ValueColumn {
	column: number;
	quantity: Quantity;
}

interface UncertaintyColumn {
	column: number;
	of: Quantity;
}

interface Columns {
	abscissa: number;
	values: ValueColumn[];
	uncertain: UncertaintyColumn[];
}

type MapReading = Pick<
	TableReading,
	'abscissa' | 'ordinates' | 'duplicates' | 'joined' | 'lowEnd' | 'highEnd'
>;

export function mapColumns(file: Sheet, reading: MapReading): MappedTable {
	const sheet = reading.joined ? joinTables(file, reading.joined, reading.abscissa.column) : file;
	const columns = columnsOf(reading);
	const quantities = columns.values.map(({ quantity }) => quantity);
	checkQuantities(quantities);
	const rows = checkOrder(readRows(sheet, columns), reading.duplicates);
	const { unit } = reading.abscissa;
	const energyOf = PHOTON_ENERGY_EV[unit];
	const ascending =
		energyOf(rows[0].abscissa) < energyOf(rows[rows.length - 1].abscissa) ? rows : [...rows].reverse();
	const energiesEv = ascending.map((row) => energyOf(row.abscissa));
	const given = {
		abscissaUnit: unit,
		quantities,
		abscissa: rows.map((row) => row.abscissa),
		ordinates: quantities.map((_, index) => rows.map((row) => row.ordinates[index]))
	};
	const uncertainties = columns.uncertain.map(({ of }, index) => ({
		quantity: of,
		values: rows.map((row) => row.uncertainties[index])
	}));
	const measuredRangeEv = { low: energiesEv[0], high: energiesEv[energiesEv.length - 1] };

	if (quantities[0] === 'epsilonImaginary') {
		const frequenciesRadPerS = ascending.map((row) => angularFrequency(row.abscissa, unit));
		const epsilon = ascending.map((row) => row.ordinates[0]);
		return {
			model: { kind: 'imaginaryTable', frequenciesRadPerS, epsilon },
			given,
			uncertainties,
			rows: null,
			measuredRangeEv
		};
	}
	const column = (name: Quantity) => {
		const index = quantities.indexOf(name);
		return index < 0 ? undefined : ascending.map((row) => row.ordinates[index]);
	};
	const { epsilon1, epsilon2 } = permittivity(column);
	const { lowEnd, highEnd } = reading;
	return {
		model: { kind: 'table', energiesEv, epsilon2, lowEnd, highEnd },
		given,
		uncertainties,
		rows: { energiesEv, epsilon1, epsilon2 },
		measuredRangeEv
	};
}

/** eps = (n + i k)^2, or as given. */
function permittivity(column: (name: Quantity) => number[] | undefined) {
	const [n, k] = [column('n'), column('k')];
	if (n && k) {
		// The product form of n^2 - k^2 keeps its digits where n and k are close.
		return {
			epsilon1: n.map((value, i) => (value - k[i]) * (value + k[i])),
			epsilon2: n.map((value, i) => 2 * value * k[i])
		};
	}
	return { epsilon1: column('epsilon1') ?? null, epsilon2: column('epsilon2') ?? [] };
}

const COMBINATIONS = ['n,k', 'epsilon1,epsilon2', 'epsilon2', 'epsilonImaginary'];

function checkQuantities(quantities: Quantity[]): void {
	const sorted = [...quantities].sort((a, b) => (a < b ? 1 : -1)).join(',');
	const known = COMBINATIONS.some(
		(combination) =>
			combination
				.split(',')
				.sort((a, b) => (a < b ? 1 : -1))
				.join(',') === sorted
	);
	if (known) return;
	throw new InvalidInput('The columns do not determine a permittivity.', [
		{
			path: 'description.ordinates',
			message: 'give n and k, or epsilon1 and epsilon2, or epsilon2 alone, or epsilonImaginary alone'
		}
	]);
}

function columnsOf({ abscissa, ordinates }: MapReading): Columns {
	const used = [abscissa.column, ...ordinates.map(({ column }) => column)];
	if (new Set(used).size < used.length) {
		throw new InvalidInput('One column was given two meanings.', [
			{ path: 'description.ordinates', message: 'each column of the file may be used once' }
		]);
	}
	const values = ordinates.flatMap(({ column, quantity }) => (quantity ? [{ column, quantity }] : []));
	const uncertain = ordinates.flatMap((ordinate, index) => uncertaintyOf(ordinate, index, values));
	if (new Set(uncertain.map(({ of }) => of)).size < uncertain.length) {
		throw new InvalidInput('One quantity was given two uncertainties.', [
			{ path: 'description.ordinates', message: 'a column of values has at most one of uncertainties' }
		]);
	}
	return { abscissa: abscissa.column, values, uncertain };
}

function uncertaintyOf(
	{ column, uncertaintyOf: of }: Ordinate,
	index: number,
	values: ValueColumn[]
): UncertaintyColumn[] {
	if (of === undefined) return [];
	const owner = values.find((value) => value.column === of);
	if (owner) return [{ column, of: owner.quantity }];
	throw new InvalidInput('A column of uncertainties belongs to no column of values.', [
		{
			path: `description.ordinates[${index}].uncertaintyOf`,
			message: `column ${of} is not one of the columns that hold a quantity`
		}
	]);
}

function readRows(sheet: Sheet, { abscissa, values, uncertain }: Columns): Row[] {
	const faults = [
		{ column: abscissa, of: abscissaFault },
		...values.map(({ column, quantity }) => ({
			column,
			of: (value: number) => ordinateFault(quantity, value)
		})),
		...uncertain.map(({ column }) => ({ column, of: uncertaintyFault }))
	];
	const issues: FileIssue[] = [];
	const rows = sheet.rows.map(({ line, cells }) => {
		const numbers = faults.map(({ column, of: faultOf }) => {
			const text = cells[column - 1];
			const report = (rule: string, message: string) => {
				issues.push({ line, column, rule, message, text: text ?? '' });
				return Number.NaN;
			};
			if (text === undefined) return report('width', `the line has no column ${column}`);
			const read = readNumber(text, sheet.decimal);
			if (!('value' in read)) return report(read.rule, read.message);
			const fault = faultOf(read.value);
			return fault ? report(...fault) : read.value;
		});
		return {
			line,
			abscissa: numbers[0],
			ordinates: numbers.slice(1, 1 + values.length),
			uncertainties: numbers.slice(1 + values.length)
		};
	});
	if (issues.length > 0) throw new RefusedFile(issues);
	if (rows.length < 2) {
		const message = 'a table needs at least two rows';
		throw new RefusedFile([{ line: rows[0].line, column: null, rule: 'rows', message, text: '' }]);
	}
	return rows;
}

const abscissaFault = (value: number): [string, string] | undefined =>
	value > 0 ? undefined : ['abscissa', 'the abscissa must be above zero'];

const uncertaintyFault = (value: number): [string, string] | undefined =>
	value >= 0 ? undefined : ['uncertainty', 'an uncertainty is not negative'];

function ordinateFault(quantity: Quantity, value: number): [string, string] | undefined {
	switch (quantity) {
		case 'n':
			return value >= 0
				? undefined
				: ['passivity', 'n is negative; a passive medium has n and k of one sign'];
		case 'k':
			return value >= 0
				? undefined
				: [
						'passivity',
						'k is negative, which means gain; files of the other sign convention need their sign turned'
					];
		case 'epsilon2':
			return value >= 0
				? undefined
				: [
						'passivity',
						"eps'' is negative, which means gain; files of the other sign convention need their sign turned"
					];
		case 'epsilonImaginary':
			return value >= 1 ? undefined : ['passivity', 'eps(i xi) is below 1; no passive medium has that'];
		case 'epsilon1':
			return undefined;
	}
}

/** Strictly one way along the file: a table that turns around is two tables, and which one is meant is not ours to guess. */
function checkOrder(rows: Row[], duplicates: TableReading['duplicates']): Row[] {
	const kept: Row[] = [rows[0]];
	const issues: FileIssue[] = [];
	const sign = Math.sign(rows[rows.length - 1].abscissa - rows[0].abscissa) || 1;
	for (const row of rows.slice(1)) {
		const last = kept[kept.length - 1];
		const step = (row.abscissa - last.abscissa) * sign;
		if (step > 0) {
			kept.push(row);
			continue;
		}
		const equal = step === 0 && row.ordinates.every((value, index) => value === last.ordinates[index]);
		if (equal && duplicates === 'merge-equal') continue;
		issues.push({
			line: row.line,
			column: null,
			rule: step === 0 ? 'duplicate' : 'order',
			message:
				step === 0
					? `the abscissa ${row.abscissa} stands in line ${last.line} already`
					: `the abscissa ${row.abscissa} turns back behind that of line ${last.line}, ${last.abscissa}`,
			text: String(row.abscissa)
		});
	}
	if (issues.length > 0) throw new RefusedFile(issues);
	return kept;
}
