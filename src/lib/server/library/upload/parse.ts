import Papa from 'papaparse';
import { readNumber } from './number.ts';
import { RefusedFile, refuse } from './refused-file.ts';

/** An uploaded text as a sheet of cells with their line numbers; nothing is interpreted but the layout. */

export interface SheetRow {
	line: number;
	cells: string[];
}

export interface Sheet {
	delimiter: Delimiter;
	decimal: '.' | ',';
	/** Lines before the first row of numbers that are neither blank nor comments: header, then units. */
	headings: SheetRow[];
	rows: SheetRow[];
	comments: string[];
}

export type Delimiter = ',' | ';' | '\t' | ' ';

export interface SheetOptions {
	delimiter?: Delimiter;
	decimal?: '.' | ',';
	skipRows?: number;
}

interface Layout {
	delimiter: Delimiter;
	decimal: '.' | ',';
}

const COMMENT = /^\s*(#|%|\/\/|!)/;
const ROWS_MAX = 20_000;
const HEADINGS_MAX = 10;

export function parseSheet(text: string, { skipRows = 0, ...given }: SheetOptions = {}): Sheet {
	const comments: string[] = [];
	const lines: { line: number; text: string }[] = [];
	text.split('\n').forEach((content, index) => {
		if (index < skipRows || content.trim() === '') return;
		if (COMMENT.test(content)) comments.push(content.trim());
		else lines.push({ line: index + 1, text: content });
	});
	if (lines.length === 0) refuse('empty', 'no line holds data', Math.max(skipRows, 1));

	const { delimiter, decimal } = settle(lines, given);
	const split = splitter(delimiter);
	const rows: SheetRow[] = [];
	const headings: SheetRow[] = [];
	for (const { line, text: content } of lines) {
		const row = { line, cells: split(content, line) };
		const isHeading = !row.cells.some((cell) => isNumber(cell, decimal)) || isUnitsRow(row.cells);
		if (rows.length === 0 && isHeading) headings.push(row);
		else rows.push(row);
	}
	if (rows.length === 0) refuse('empty', 'no line begins with a number', lines[0].line, lines[0].text);
	if (rows.length > ROWS_MAX)
		refuse('rows', `the table has ${rows.length} rows; at most ${ROWS_MAX} are taken`, rows[ROWS_MAX].line);
	if (headings.length > HEADINGS_MAX)
		refuse(
			'heading',
			`${headings.length} lines of text come before the numbers; mark them as comments with # or skip them`,
			headings[HEADINGS_MAX].line,
			headings[HEADINGS_MAX].cells.join(' ')
		);
	checkWidths(rows);
	return { delimiter, decimal, headings, rows, comments };
}

const isNumber = (cell: string, decimal: '.' | ',') => 'value' in readNumber(cell, decimal);

const UNIT = /^[([]?(ev|nm|um|µm|μm|cm\^?-1|1\/cm|hz|thz|rad\/s|s\^?-1|none|-|)[)\]]?$/i;

/** "nm;1;1": units of which some are one. A first row of numbers with a slip in it is not taken for that. */
const isUnitsRow = (cells: string[]): boolean =>
	cells.some((cell) => UNIT.test(cell) && cell !== '') &&
	cells.every((cell) => cell === '1' || UNIT.test(cell));

/** Which delimiter and decimal sign: as told, or the only pair under which every numeric line has the same width. */
function settle(
	lines: { line: number; text: string }[],
	given: Pick<SheetOptions, 'delimiter' | 'decimal'>
): { delimiter: Delimiter; decimal: '.' | ',' } {
	if (given.delimiter && given.decimal) return { delimiter: given.delimiter, decimal: given.decimal };
	const delimiters: Delimiter[] = given.delimiter ? [given.delimiter] : [';', '\t', ',', ' '];
	const decimals: ('.' | ',')[] = given.decimal ? [given.decimal] : ['.', ','];
	const sampled = lines.slice(-50);
	const candidates = delimiters
		.flatMap((delimiter) => decimals.map((decimal) => ({ delimiter, decimal })))
		.filter(({ delimiter, decimal }) => delimiter !== ',' || decimal !== ',');
	const fitting = candidates.filter(({ delimiter, decimal }) => fits(sampled, delimiter, decimal));
	const [first, ...others] = fitting;
	if (!first) {
		const { delimiter, decimal } = nearest(sampled, candidates) ?? { delimiter: ',', decimal: '.' };
		return { delimiter: given.delimiter ?? delimiter, decimal: given.decimal ?? decimal };
	}
	// Whole numbers read the same with either decimal sign, and a tab is also a blank: neither is a doubt.
	const rival = others.find((other) => reading(sampled, other) !== reading(sampled, first));
	if (rival) ask(sampled[0], `split by "${first.delimiter}" or by "${rival.delimiter}"`);
	if (first.delimiter === ',' && !given.delimiter && sampled.every(({ text }) => mayBePairs(text)))
		ask(sampled[0], 'of whole numbers or as half as many numbers with decimal commas');
	return first;
}

/** Some line is wrong whichever way it is read: the way that leaves fewest wrong, so that the problems told are the real ones. */
function nearest(lines: { text: string }[], candidates: Layout[]): Layout | undefined {
	const scored = candidates.map((layout) => {
		const widths = new Map<number, number>();
		for (const { text } of lines) {
			const cells = plainSplit(text, layout.delimiter);
			if (cells.length < 2 || !cells.every((cell) => isNumber(cell, layout.decimal))) continue;
			widths.set(cells.length, (widths.get(cells.length) ?? 0) + 1);
		}
		return { layout, score: Math.max(0, ...widths.values()) };
	});
	const best = Math.max(...scored.map(({ score }) => score));
	return best > 0 ? scored.find(({ score }) => score === best)?.layout : undefined;
}

function ask({ line, text }: { line: number; text: string }, between: string): never {
	const message = `the columns can be read as ${between}; say which delimiter and decimal sign are meant`;
	throw new RefusedFile([{ line, column: null, rule: 'ambiguous', message, text }], 'ambiguous');
}

/** "0,5,1,2" is four whole numbers or 0.5 and 1.2. Text lines say nothing either way. */
function mayBePairs(text: string): boolean {
	const cells = text.split(',').map((cell) => cell.trim());
	if (!cells.some((cell) => isNumber(cell, '.'))) return true;
	return (
		cells.length >= 4 &&
		cells.length % 2 === 0 &&
		cells.every((cell, i) => (i % 2 ? /^\d+$/ : /^[+-]?\d+$/).test(cell))
	);
}

function fits(lines: { line: number; text: string }[], delimiter: Delimiter, decimal: '.' | ','): boolean {
	const widths = new Set<number>();
	for (const { text } of lines) {
		const cells = plainSplit(text, delimiter);
		if (cells.length < 2) return false;
		if (isUnitsRow(cells)) continue;
		const numbers = cells.filter((cell) => isNumber(cell, decimal)).length;
		if (numbers === 0) continue;
		if (numbers < cells.length) return false;
		widths.add(cells.length);
	}
	return widths.size === 1;
}

const reading = (
	lines: { text: string }[],
	{ delimiter, decimal }: { delimiter: Delimiter; decimal: '.' | ',' }
): string =>
	lines
		.map(({ text }) =>
			plainSplit(text, delimiter)
				.map((cell) => {
					const read = readNumber(cell, decimal);
					return 'value' in read ? read.value : cell;
				})
				.join('|')
		)
		.join('\n');

const plainSplit = (text: string, delimiter: Delimiter): string[] =>
	delimiter === ' ' ? text.trim().split(/\s+/) : text.split(delimiter);

/** Quotes are honoured where a delimiter can stand inside them; a quote left open is refused where it is. */
function splitter(delimiter: Delimiter): (text: string, line: number) => string[] {
	if (delimiter === ' ') return (text) => text.trim().split(/\s+/);
	return (text, line) => {
		if (!text.includes('"')) return text.split(delimiter).map((cell) => cell.trim());
		const parsed = Papa.parse<string[]>(text, { delimiter });
		const broken = parsed.errors.find((error) => error.type === 'Quotes');
		if (broken) refuse('quotes', 'a quotation mark is left open or stands inside a cell', line, text);
		return parsed.data[0].map((cell) => cell.trim());
	};
}

function checkWidths(rows: SheetRow[]): void {
	const width = rows[0].cells.length;
	const issues = rows
		.filter((row) => row.cells.length !== width)
		.map((row) => ({
			line: row.line,
			column: null,
			rule: 'width',
			message: `the line has ${row.cells.length} cells, the first row of numbers has ${width}`,
			text: row.cells.join(' ')
		}));
	if (issues.length > 0) throw new RefusedFile(issues);
}
