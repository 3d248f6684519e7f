import type { AbscissaUnit } from './upload.ts';

/** What an upload reads as so far, as the page gets it: the sheet, the guess over its columns, what is wrong where, a picture. */

export interface ColumnGuess {
	/** By column, from the first: `abscissa`, a quantity, `uncertainty:2`, or nothing. */
	roles: string[];
	/** Null where neither the headings nor the numbers tell it: a frequency must say which one it is. */
	unit: AbscissaUnit | null;
	/** Whether a heading said so, or the numbers only look like it. */
	unitFrom: 'heading' | 'numbers' | null;
}

/** One thing wrong with an uploaded file: where it is, which rule it breaks, and what would be right. */
export interface FileIssue {
	line: number;
	/** Counted from 1; null where the whole line is meant. */
	column: number | null;
	rule: string;
	message: string;
	/** The text itself, cut short; shown escaped. */
	text: string;
}

/** How far a stated end of a table misses the table where they meet. */
export interface JointMismatch {
	/** Of the low end with the table, or of a second table with the first. */
	end: 'low' | 'joined';
	energyEv: number;
	/** eps'' of the end, or of the second table, over what it meets, less one, in per cent. */
	percent: number;
}

export interface Thumbnail {
	/** hbar*omega in eV and eps'' as read; null where the file holds eps(i xi). */
	points: [energyEv: number, epsilon2: number][] | null;
	/** eps'' outside the table, as the ends say. */
	below: [energyEv: number, epsilon2: number][];
	above: [energyEv: number, epsilon2: number][];
	/** hbar*xi in eV. */
	imaginary: [energyEv: number, epsilon: number][];
	rowCount: number | null;
	measuredRangeEv: { low: number; high: number } | null;
}

export interface FormProblem {
	/** Name of the form's field. */
	field: string;
	message: string;
}

export interface UploadPreview {
	sheet: {
		delimiter: string;
		decimal: string;
		width: number;
		rowCount: number;
		headings: { line: number; cells: string[] }[];
		rows: { line: number; cells: string[] }[];
		comments: string[];
	} | null;
	guess: ColumnGuess | null;
	/** Problems of the file by line, at most 100. */
	fileIssues: FileIssue[];
	/** Problems of the form by field. */
	problems: FormProblem[];
	ambiguous: boolean;
	joints: JointMismatch[];
	thumbnail: Thumbnail | null;
}
