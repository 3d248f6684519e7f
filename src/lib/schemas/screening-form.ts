import { parseLengthNm, parseNumber } from '../format/length.ts';

/** A statement of a screening as a page's form has it: every field a text, and back again. */

export const SCREENING_FIELDS = [
	'name',
	...(['left', 'medium', 'right'] as const).flatMap((side) => [
		`${side}.class`,
		`${side}.search`,
		`${side}.versions`,
		`${side}.hazard`,
		`${side}.measuredToEv`,
		`${side}.coating.of`,
		`${side}.coating.from`,
		`${side}.coating.to`,
		`${side}.coating.count`
	]),
	'pairs',
	'separationsNm',
	'temperatureK',
	'rules',
	'rivals',
	'criterion.kind',
	'criterion.fromNm',
	'criterion.toNm',
	'criterion.pressurePa'
] as const;

export type ScreeningTyped = Record<string, string>;

/** What the form begins with: a search for repulsion in liquids. */
export const SCREENING_BEGIN: ScreeningTyped = {
	name: '',
	'left.class': 'solid',
	'medium.class': 'liquid',
	'medium.hazard': 'danger',
	pairs: 'same',
	separationsNm: '20, 50, 100, 200, 500',
	temperatureK: '300',
	rules: 'written',
	rivals: 'all',
	'criterion.kind': 'repulsive',
	'criterion.fromNm': '50 nm',
	'criterion.toNm': '200 nm'
};

const pieces = (text: string): string[] =>
	text
		.split(/[\s,;]+/)
		.map((piece) => piece.trim())
		.filter((piece) => piece !== '');

/** Lengths may carry a unit: "50 nm, 2 um". What cannot be read stays a text, for the schema to name. */
const lengths = (text: string): unknown[] =>
	text
		.split(/[,;]/)
		.map((piece) => piece.trim())
		.filter((piece) => piece !== '')
		.map((piece) => parseLengthNm(piece) ?? piece);

const length = (text: string | undefined): unknown => {
	const trimmed = (text ?? '').trim();
	return trimmed === '' ? undefined : (parseLengthNm(trimmed) ?? trimmed);
};

const number = (text: string | undefined): unknown => {
	const trimmed = (text ?? '').trim();
	return trimmed === '' ? undefined : (parseNumber(trimmed) ?? trimmed);
};

const given = <T extends Record<string, unknown>>(fields: T): Partial<T> =>
	Object.fromEntries(
		Object.entries(fields).filter(([, value]) => value !== undefined && value !== '')
	) as Partial<T>;

function side(typed: ScreeningTyped, name: 'left' | 'medium' | 'right'): Record<string, unknown> {
	const field = (key: string) => (typed[`${name}.${key}`] ?? '').trim();
	const versions = pieces(field('versions'));
	const of = field('coating.of');
	const [from, to, count] = [
		length(field('coating.from')),
		length(field('coating.to')),
		number(field('coating.count'))
	];
	return given({
		class: field('class'),
		search: field('search'),
		versions: versions.length > 0 ? versions : undefined,
		hazard: field('hazard') === 'danger' ? undefined : field('hazard'),
		measuredToEv: number(field('measuredToEv')),
		coating:
			of === ''
				? undefined
				: { of, thicknessNm: to === undefined && count === undefined ? from : { from, to, count } }
	});
}

/** To be checked by `newScreening`. */
export function screeningFromForm(typed: ScreeningTyped): unknown {
	const temperatures = pieces(typed.temperatureK ?? '').map((piece) => parseNumber(piece) ?? piece);
	return {
		name: typed.name ?? '',
		statement: {
			left: side(typed, 'left'),
			medium: side(typed, 'medium'),
			...(typed.pairs === 'own' ? { right: side(typed, 'right') } : {}),
			separationsNm: lengths(typed.separationsNm ?? ''),
			temperatureK: temperatures.length === 1 ? temperatures[0] : temperatures,
			rules: pieces(typed.rules ?? ''),
			rivals: typed.rivals ?? '',
			criterion: given({
				kind: typed['criterion.kind'],
				fromNm: length(typed['criterion.fromNm']),
				toNm: length(typed['criterion.toNm']),
				pressurePa: typed['criterion.kind'] === 'below' ? number(typed['criterion.pressurePa']) : undefined
			})
		}
	};
}
