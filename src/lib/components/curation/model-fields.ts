import type { PermittivityModel } from '$lib/engine/contract.ts';

/**
 * Every closed form that can be typed in: its fields with their units. A new kind of model is one more entry. Models of models
 * (mixtures, laws of temperature) and tables are written as JSON.
 */

export interface FigureField {
	/** In the contract; `bandUm.from` stands in an object of its own. */
	name: string;
	label: string;
	unit: string;
}

export interface ClosedForm {
	kind: Exclude<
		PermittivityModel['kind'],
		'sum' | 'table' | 'imaginaryTable' | 'maxwellGarnett' | 'bruggeman' | 'temperatureDependent'
	>;
	title: string;
	/** Figures of the form itself. */
	figures: FigureField[];
	/** Figures of each of its terms; empty where it has none. */
	terms: FigureField[];
}

const ENERGY = 'eV';

const BAND: FigureField[] = [
	{ name: 'amplitudeEv', label: 'Amplitude', unit: ENERGY },
	{ name: 'energyEv', label: 'Energy', unit: ENERGY },
	{ name: 'broadeningEv', label: 'Broadening', unit: ENERGY },
	{ name: 'gapEv', label: 'Gap', unit: ENERGY }
];

export const CLOSED_FORMS: readonly ClosedForm[] = [
	{
		kind: 'lorentz',
		title: 'Lorentz oscillators',
		figures: [],
		terms: [
			{ name: 'strengthEv2', label: 'Strength', unit: 'eV²' },
			{ name: 'energyEv', label: 'Energy', unit: ENERGY },
			{ name: 'dampingEv', label: 'Damping', unit: ENERGY }
		]
	},
	{
		kind: 'ninhamParsegian',
		title: 'Undamped oscillators',
		figures: [],
		terms: [
			{ name: 'strength', label: 'Strength', unit: '1' },
			{ name: 'frequencyRadPerS', label: 'Frequency', unit: 'rad/s' }
		]
	},
	{
		kind: 'debye',
		title: 'Debye relaxation',
		figures: [],
		terms: [
			{ name: 'strength', label: 'Strength', unit: '1' },
			{ name: 'relaxationTimePs', label: 'Relaxation time', unit: 'ps' }
		]
	},
	{
		kind: 'brendelBormann',
		title: 'Brendel-Bormann oscillators',
		figures: [],
		terms: [
			{ name: 'strengthEv2', label: 'Strength', unit: 'eV²' },
			{ name: 'energyEv', label: 'Energy', unit: ENERGY },
			{ name: 'dampingEv', label: 'Damping', unit: ENERGY },
			{ name: 'widthEv', label: 'Width', unit: ENERGY }
		]
	},
	{ kind: 'taucLorentz', title: 'Tauc-Lorentz bands', figures: [], terms: BAND },
	{
		kind: 'codyLorentz',
		title: 'Cody-Lorentz bands',
		figures: [],
		terms: [...BAND, { name: 'transitionEv', label: 'Transition above the gap', unit: ENERGY }]
	},
	{
		kind: 'sellmeier',
		title: 'Sellmeier index formula',
		figures: [
			{ name: 'constant', label: 'Constant', unit: '1' },
			{ name: 'bandUm.from', label: 'Fitted from', unit: 'µm' },
			{ name: 'bandUm.to', label: 'Fitted to', unit: 'µm' }
		],
		terms: [
			{ name: 'strength', label: 'Strength', unit: '1' },
			{ name: 'wavelengthUm', label: 'Wavelength', unit: 'µm' }
		]
	},
	{
		kind: 'drude',
		title: 'Drude conductor',
		figures: [
			{ name: 'plasmaEnergyEv', label: 'Plasma energy', unit: ENERGY },
			{ name: 'dampingEv', label: 'Damping', unit: ENERGY }
		],
		terms: []
	},
	{
		kind: 'plasma',
		title: 'Plasma',
		figures: [{ name: 'plasmaEnergyEv', label: 'Plasma energy', unit: ENERGY }],
		terms: []
	},
	{
		kind: 'dcConductivity',
		title: 'Conductivity at rest',
		figures: [{ name: 'siemensPerM', label: 'Conductivity', unit: 'S/m' }],
		terms: []
	},
	{
		kind: 'constant',
		title: 'Constant',
		figures: [{ name: 'value', label: 'Permittivity', unit: '1' }],
		terms: []
	},
	{ kind: 'vacuum', title: 'Vacuum', figures: [], terms: [] },
	{ kind: 'idealConductor', title: 'Ideal conductor', figures: [], terms: [] }
];

/** One summand of the form, its figures as typed. */
export interface TypedPart {
	kind: ClosedForm['kind'];
	figures: Record<string, string>;
	terms: Record<string, string>[];
}

export const formOf = (kind: ClosedForm['kind']): ClosedForm => {
	const found = CLOSED_FORMS.find((form) => form.kind === kind);
	if (!found) throw new Error(`No form for ${kind}.`);
	return found;
};

export function emptyPart(kind: ClosedForm['kind']): TypedPart {
	const { figures, terms } = formOf(kind);
	return { kind, figures: blank(figures), terms: terms.length > 0 ? [blank(terms)] : [] };
}

export const emptyTerm = (kind: ClosedForm['kind']): Record<string, string> => blank(formOf(kind).terms);

const blank = (fields: FigureField[]) => Object.fromEntries(fields.map(({ name }) => [name, '']));

/** Null where the JSON is no closed form that the fields can hold: then it stays text. */
export function partsOf(json: string): TypedPart[] | null {
	let model: unknown;
	try {
		model = JSON.parse(json);
	} catch {
		return null;
	}
	const summands = isRecord(model) && model.kind === 'sum' ? model.of : [model];
	if (!Array.isArray(summands)) return null;
	const parts = summands.map(partOf);
	return parts.every((part) => part !== null) ? parts : null;
}

function partOf(model: unknown): TypedPart | null {
	if (!isRecord(model)) return null;
	const form = CLOSED_FORMS.find(({ kind }) => kind === model.kind);
	if (!form) return null;
	const known = [
		'kind',
		...form.figures.map(({ name }) => name.split('.')[0]),
		...(form.terms.length > 0 ? ['terms'] : [])
	];
	if (Object.keys(model).some((name) => !known.includes(name))) return null;
	const terms = form.terms.length > 0 ? model.terms : [];
	if (!Array.isArray(terms) || !terms.every(isRecord)) return null;
	return {
		kind: form.kind,
		figures: textsOf(form.figures, model),
		terms: terms.map((term) => textsOf(form.terms, term))
	};
}

const textsOf = (fields: FigureField[], from: Record<string, unknown>) =>
	Object.fromEntries(
		fields.map(({ name }) => {
			const value = valueAt(from, name.split('.'));
			return [name, value === undefined ? '' : String(value)];
		})
	);

function valueAt(from: unknown, [name, ...rest]: string[]): unknown {
	const value = isRecord(from) ? from[name] : undefined;
	return rest.length === 0 ? value : valueAt(value, rest);
}

const isRecord = (value: unknown): value is Record<string, unknown> =>
	typeof value === 'object' && value !== null && !Array.isArray(value);

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d{1,3})?$/;

/** The contract's MODEL as JSON; what is no number stays the text it is, so that the server names its field. */
export function jsonOf(parts: readonly TypedPart[]): string {
	const models = parts.map(({ kind, figures, terms }) => ({
		kind,
		...numbersOf(figures),
		...(formOf(kind).terms.length > 0 ? { terms: terms.map(numbersOf) } : {})
	}));
	if (models.length === 0) return '';
	return JSON.stringify(models.length === 1 ? models[0] : { kind: 'sum', of: models }, null, '\t');
}

function numbersOf(texts: Record<string, string>): Record<string, unknown> {
	const numbers: Record<string, unknown> = {};
	for (const [name, text] of Object.entries(texts)) {
		const value = NUMBER.test(text.trim()) ? Number(text) : text;
		const [first, inner] = name.split('.');
		if (inner === undefined) numbers[first] = value;
		else numbers[first] = { ...(numbers[first] as object | undefined), [inner]: value };
	}
	return numbers;
}
