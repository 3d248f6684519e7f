import type { ForcePoint } from '../engine/contract.ts';
import type { Quantity } from '../schemas/study.ts';
import { readingOf } from './series.ts';

/** The plotted numbers as rows: for the table of the page and, with every digit, for the CSV file. */

export interface TableColumn {
	letter: string;
	points: readonly (ForcePoint | undefined)[];
}

export interface TableRow {
	separationNm: number;
	/** One a choice: value and relative bound. */
	cells: ({ value: number; bound: number } | undefined)[];
}

export function tableRows(columns: readonly TableColumn[], quantity: Quantity): TableRow[] {
	const rows = new Map<number, TableRow>();
	columns.forEach(({ points }, column) => {
		for (const point of points) {
			const reading = point && readingOf(point, quantity);
			if (!point || !reading) continue;
			const row = rows.get(point.separationNm) ?? {
				separationNm: point.separationNm,
				cells: new Array<TableRow['cells'][number]>(columns.length).fill(undefined)
			};
			row.cells[column] = { value: reading.value, bound: reading.bound };
			rows.set(point.separationNm, row);
		}
	});
	return [...rows.values()].sort((a, b) => a.separationNm - b.separationNm);
}

export const BASE_UNITS: Record<Quantity, string> = {
	pressure: 'Pa',
	energy: 'J/m^2',
	gradient: 'Pa/m',
	force: 'N'
};

const quoted = (text: string) => (/[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);

/**
 * CSV of exactly the plotted numbers: provenance as comment lines, names, units, rows. The shortest text that reads
 * back to the same double; hyphen for minus.
 */
export function curveCsv(
	columns: readonly TableColumn[],
	quantity: Quantity,
	unit: string,
	provenance: readonly string[]
): string {
	const names = [
		'separation',
		...columns.flatMap(({ letter }) => [`${quantity}_${letter}`, `bound_${letter}`])
	];
	const units: string[] = ['nm', ...columns.flatMap(() => [unit, '1'])];
	const rows = tableRows(columns, quantity).map(({ separationNm, cells }) =>
		[
			separationNm,
			...cells.flatMap((cell): (string | number)[] => (cell ? [cell.value, cell.bound] : ['', '']))
		].map(String)
	);
	const comments = provenance.map((line) => `# ${line.replace(/\s+/g, ' ')}`);
	return (
		[...comments, ...[names, units, ...rows].map((row) => row.map(quoted).join(','))].join('\r\n') + '\r\n'
	);
}
