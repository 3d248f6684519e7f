import { z } from 'zod';
import { Refusal } from '../../../engine/refusal.ts';
import { fieldOf, layoutOf, readingOf, type UploadForm } from '../../../schemas/upload-form.ts';
import type { ColumnGuess, UploadPreview } from '../../../schemas/upload-preview.ts';
import { tableReading, type AbscissaUnit } from '../../../schemas/upload.ts';
import { InvalidInput } from '../../errors.ts';
import { issuesOf } from '../../api/issues.ts';
import { decode } from './decode.ts';
import { guessColumns } from './guess-columns.ts';
import { jointMismatches, tableJoint } from './joints.ts';
import { mapColumns, type MappedTable } from './map-columns.ts';
import { parseSheet, type Sheet, type SheetOptions } from './parse.ts';
import { readNumber } from './number.ts';
import { PHOTON_ENERGY_EV } from './photon-energy.ts';
import { RefusedFile } from './refused-file.ts';
import { readModelJson } from './model-json.ts';
import { modelThumbnail, thumbnail } from './thumbnail.ts';

/** What an upload reads as so far: the sheet, the guess over each column, what is wrong in which line, a picture. */

const ROWS_SHOWN = 12;
const CELL_MAX = 40;

const layout = z.object({
	delimiter: z.enum([',', ';', '\t', ' ']).optional(),
	decimal: z.enum(['.', ',']).optional(),
	skipRows: z.int().min(0).max(10_000)
});

const EMPTY: UploadPreview = {
	sheet: null,
	guess: null,
	fileIssues: [],
	problems: [],
	ambiguous: false,
	joints: [],
	thumbnail: null
};

/** Of a closed form; nothing is wrong while nothing was typed. */
export function previewOfModel(form: UploadForm): UploadPreview {
	if (!form.model?.trim()) return EMPTY;
	try {
		return { ...EMPTY, thumbnail: modelThumbnail(readModelJson(form.model)) };
	} catch (error) {
		return { ...EMPTY, ...toldBy(error) };
	}
}

/** Never throws for what a file or a form may hold. */
export function previewOf(raw: Uint8Array, form: UploadForm): UploadPreview {
	let sheet: Sheet;
	try {
		sheet = parseSheet(decode(raw), layoutFrom(form));
	} catch (error) {
		return { ...EMPTY, ...toldBy(error) };
	}
	const guess = guessColumns(sheet);
	const read = { ...EMPTY, sheet: shown(sheet), guess };
	try {
		const table = mapSheet(sheet, withGuess(form, guess));
		const joints = [...jointMismatches(table.model), ...jointOf(sheet, table)];
		return { ...read, joints, thumbnail: thumbnail(table) };
	} catch (error) {
		return { ...read, ...toldBy(error) };
	}
}

/** The file's rows lie at one end of the joined table; which one, its first row tells. */
function jointOf(sheet: Sheet, { model, given }: MappedTable) {
	if (model.kind !== 'table' || given.abscissa.length <= sheet.rows.length) return [];
	const first = sheet.rows[0].cells.map((cell) => readNumber(cell, sheet.decimal));
	const startsFile = first.some((read) => 'value' in read && read.value === given.abscissa[0]);
	const isRising =
		PHOTON_ENERGY_EV[given.abscissaUnit as AbscissaUnit](given.abscissa[0]) === model.energiesEv[0];
	const fileIsLower = startsFile === isRising;
	const total = model.energiesEv.length;
	return tableJoint(model, fileIsLower ? sheet.rows.length : total - sheet.rows.length);
}

function layoutFrom(form: UploadForm): SheetOptions {
	const parsed = layout.safeParse(layoutOf(form));
	if (parsed.success) return parsed.data;
	throw new InvalidInput('The layout is not understood.', issuesOf(parsed.error));
}

/** As typed; where nothing was said about any column yet, as guessed. */
export function withGuess(form: UploadForm, guess: ColumnGuess): UploadForm {
	if (Object.keys(form).some((name) => name.startsWith('column.'))) return form;
	const columns = guess.roles.map((role, index) => [`column.${index + 1}`, role]);
	return { abscissaUnit: guess.unit ?? '', ...form, ...Object.fromEntries(columns) };
}

function mapSheet(sheet: Sheet, form: UploadForm): MappedTable {
	const parsed = tableReading.safeParse(readingOf(form));
	if (!parsed.success) throw new InvalidInput('The columns are not understood.', issuesOf(parsed.error));
	return mapColumns(sheet, parsed.data);
}

function toldBy(error: unknown): Pick<UploadPreview, 'fileIssues' | 'problems' | 'ambiguous'> {
	if (error instanceof RefusedFile) {
		return { fileIssues: error.issues, problems: [], ambiguous: error.code === 'ambiguous' };
	}
	if (error instanceof InvalidInput || error instanceof Refusal) {
		const problems = error.issues.map(({ path, message }) => ({ field: fieldOf(path), message }));
		return { fileIssues: [], problems, ambiguous: false };
	}
	throw error;
}

function shown(sheet: Sheet): UploadPreview['sheet'] {
	const cut = ({ line, cells }: { line: number; cells: string[] }) => ({
		line,
		cells: cells.map((cell) => cell.slice(0, CELL_MAX))
	});
	return {
		delimiter: sheet.delimiter,
		decimal: sheet.decimal,
		width: sheet.rows[0].cells.length,
		rowCount: sheet.rows.length,
		headings: sheet.headings.map(cut),
		rows: sheet.rows.slice(0, ROWS_SHOWN).map(cut),
		comments: sheet.comments.slice(0, 5).map((comment) => comment.slice(0, 120))
	};
}
