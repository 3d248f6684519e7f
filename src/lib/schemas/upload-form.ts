import type { AbscissaUnit, Ordinate, Quantity } from './upload.ts';

/**
 * The upload form as typed, a flat record of texts, and what it says in the contract's terms. Nothing is checked here: what does
 * not read as a number goes on as the text it is, for the schema to refuse by its name.
 */

export type UploadForm = Record<string, string>;

export const UNIT_WORDS: Record<AbscissaUnit, string> = {
	eV: 'photon energy, eV',
	nm: 'wavelength, nm',
	um: 'wavelength, µm',
	'cm^-1': 'wavenumber, cm⁻¹',
	Hz: 'ordinary frequency, Hz',
	'rad/s': 'angular frequency, rad/s'
};

export const QUANTITY_WORDS: Record<Quantity, string> = {
	n: 'n',
	k: 'k',
	epsilon1: 'ε′',
	epsilon2: 'ε″',
	epsilonImaginary: 'ε(iξ)'
};

/** What a column may be: `abscissa`, a quantity, `uncertainty:2` of the column 2, or nothing. */
export const columnField = (column: number): string => `column.${column}`;

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d{1,3})?$/;

/** Undefined where nothing was typed; the text itself where it is no number. */
function numeric(text: string | undefined): number | string | undefined {
	const trimmed = (text ?? '').trim();
	if (trimmed === '') return undefined;
	return NUMBER.test(trimmed) ? Number(trimmed) : trimmed;
}

const textual = (text: string | undefined): string | undefined => (text?.trim() ? text.trim() : undefined);

function columnsOf(form: UploadForm): { abscissa: number | undefined; ordinates: Ordinate[] } {
	let abscissa: number | undefined;
	const ordinates: Ordinate[] = [];
	for (const [name, role] of Object.entries(form)) {
		const column = Number(/^column\.(\d{1,3})$/.exec(name)?.[1] ?? Number.NaN);
		if (!Number.isInteger(column) || !role) continue;
		if (role === 'abscissa') abscissa = column;
		else if (role.startsWith('uncertainty:'))
			ordinates.push({ column, uncertaintyOf: Number(role.slice('uncertainty:'.length)) });
		else ordinates.push({ column, quantity: role as Quantity });
	}
	return { abscissa, ordinates };
}

function lowEndOf(form: UploadForm): unknown {
	const kind = form['lowEnd.kind'] ?? 'none';
	if (kind === 'drude') {
		const plasmaEnergyEv = numeric(form['lowEnd.plasmaEnergyEv']);
		return { kind, plasmaEnergyEv, dampingEv: numeric(form['lowEnd.dampingEv']) };
	}
	if (kind === 'plasma') return { kind, plasmaEnergyEv: numeric(form['lowEnd.plasmaEnergyEv']) };
	if (kind === 'power') return { kind, exponent: numeric(form['lowEnd.exponent']) };
	return { kind };
}

function highEndOf(form: UploadForm): unknown {
	const kind = form['highEnd.kind'] ?? 'none';
	return kind === 'power' ? { kind, exponent: numeric(form['highEnd.exponent']) } : { kind };
}

const DELIMITERS: Record<string, string> = { tab: '\t', blank: ' ', comma: ',', semicolon: ';' };
const DECIMALS: Record<string, string> = { point: '.', comma: ',' };

/** How the file is to be read: the part of the description that a preview needs. */
export function readingOf(form: UploadForm): Record<string, unknown> {
	const { abscissa, ordinates } = columnsOf(form);
	return {
		delimiter: DELIMITERS[form.delimiter ?? ''],
		decimal: DECIMALS[form.decimal ?? ''],
		skipRows: numeric(form.skipRows),
		abscissa: { column: abscissa, unit: textual(form.abscissaUnit) },
		ordinates,
		duplicates: textual(form.duplicates),
		joined: form.joined?.trim() ? form.joined : undefined,
		lowEnd: lowEndOf(form),
		highEnd: highEndOf(form)
	};
}

/** Layout alone, as far as it is told. */
export function layoutOf(form: UploadForm): { delimiter?: string; decimal?: string; skipRows: unknown } {
	const { delimiter, decimal, skipRows } = readingOf(form);
	return { delimiter: delimiter as string, decimal: decimal as string, skipRows: skipRows ?? 0 };
}

const SAMPLE_TEXTS = ['form', 'preparation', 'substrate', 'annealing', 'method'] as const;
const SAMPLE_NUMBERS = ['thicknessNm', 'roughnessNm', 'temperatureK'] as const;

function sampleOf(form: UploadForm): Record<string, unknown> | null {
	const known = [
		...SAMPLE_TEXTS.map((name) => [name, textual(form[`sample.${name}`]) ?? null] as const),
		...SAMPLE_NUMBERS.map((name) => [name, numeric(form[`sample.${name}`]) ?? null] as const),
		['compiled', { measured: false, compiled: true }[form['sample.compiled'] ?? ''] ?? null] as const
	];
	return known.every(([, value]) => value === null) ? null : Object.fromEntries(known);
}

/** How much of the sample sheet is filled in, of nine. */
export function sampleCompleteness(form: UploadForm): { given: number; of: number } {
	const sample = sampleOf(form) ?? {};
	return { given: Object.values(sample).filter((value) => value !== null).length, of: 9 };
}

function rangeOf(form: UploadForm, name: string): Record<string, unknown> | null {
	const [low, high] = [numeric(form[`${name}.low`]), numeric(form[`${name}.high`])];
	return low === undefined && high === undefined ? null : { low, high };
}

/** What is said about the numbers, of a table or of a closed form. */
function aboutOf(form: UploadForm): Record<string, unknown> {
	return {
		source: (form.source ?? '')
			.split(/[\s,;]+/)
			.map((slug) => slug.trim())
			.filter(Boolean),
		quality: textual(form.quality),
		qualityReason: textual(form.qualityReason) ?? null,
		validRangeEv: rangeOf(form, 'validRange'),
		sample: sampleOf(form),
		note: textual(form.note) ?? null,
		parent: textual(form.parent) ?? null
	};
}

export const tableDescriptionOf = (form: UploadForm): unknown => ({ ...readingOf(form), ...aboutOf(form) });

export const modelDescriptionOf = (form: UploadForm): unknown => ({
	...aboutOf(form),
	measuredRangeEv: rangeOf(form, 'measuredRange')
});

/** Name of the form's field for a path of the description; where there is none, the path itself. */
export function fieldOf(path: string): string {
	const named = path.replace(/^description\./, '').replace(/\[(\d+)\]/g, '.$1');
	if (named.startsWith('abscissa.unit')) return 'abscissaUnit';
	if (named.startsWith('abscissa') || named.startsWith('ordinates')) return 'columns';
	if (named.startsWith('source')) return 'source';
	return named.replace(/^validRangeEv/, 'validRange').replace(/^measuredRangeEv/, 'measuredRange');
}
