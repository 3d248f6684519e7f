import { readNumber } from './number.ts';
import { parseSheet, type Sheet, type SheetRow } from './parse.ts';
import { RefusedFile } from './refused-file.ts';

/**
 * A second table that continues the first, as an X-ray tail does: the same columns and units, its rows before or after those of the file.
 * Where the two overlap the order of the rows says so, and which rows to leave out is the curator's to decide.
 */
export function joinTables(sheet: Sheet, joined: string, abscissaColumn: number): Sheet {
	const { delimiter, decimal } = sheet;
	const second = parseSheet(joined.replace(/\r\n?/g, '\n'), { delimiter, decimal });
	// Lines count on from the file's last, so that a problem is found in either.
	const offset = sheet.rows[sheet.rows.length - 1].line;
	const rows = second.rows.map(({ line, cells }) => ({ line: line + offset, cells }));
	const width = sheet.rows[0].cells.length;
	const narrow = rows.find(({ cells }) => cells.length !== width);
	if (narrow) {
		const message = `the second table has ${narrow.cells.length} columns and the file has ${width}; give it the same ones`;
		throw new RefusedFile([
			{ line: narrow.line, column: null, rule: 'join', message, text: narrow.cells.join(' ') }
		]);
	}
	const at = ({ cells }: SheetRow) => {
		const read = readNumber(cells[abscissaColumn - 1] ?? '', decimal);
		return 'value' in read ? read.value : Number.NaN;
	};
	const way = Math.sign(at(sheet.rows[sheet.rows.length - 1]) - at(sheet.rows[0]));
	const ordered = (at(rows[rows.length - 1]) - at(rows[0])) * way < 0 ? [...rows].reverse() : rows;
	const isBefore = (at(ordered[ordered.length - 1]) - at(sheet.rows[0])) * way < 0;
	return { ...sheet, rows: isBefore ? [...ordered, ...sheet.rows] : [...sheet.rows, ...ordered] };
}
