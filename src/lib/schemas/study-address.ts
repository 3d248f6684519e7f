import { versionRef, zeroFrequencyRule } from './arrangement.ts';
import {
	CHOICE_NAME_MAX,
	CHOICES_MAX,
	MARK_LABEL_MAX,
	MARKS_MAX,
	SEPARATION_RANGE_NM,
	SHEET_RANGE_SIEMENS,
	TEMPERATURE_RANGE_K,
	THICKNESS_RANGE_NM
} from './study-limits.ts';
import { materialAt } from './study-slots.ts';
import {
	quantity,
	slotName,
	study as studySchema,
	type ModelChoice,
	type SlotChange,
	type SlotMaterial,
	type Study,
	type StudyMark,
	type StudyBody
} from './study.ts';
import { decodeConditions } from './study-address-conditions.ts';
import { decodeShape } from './study-address-shape.ts';
import { WORKED_STUDY } from './study-worked.ts';

/**
 * A study in the query of an address, readable and short:
 *
 *   /?left=silica-a@1.0:20nm,gold-drude@1.0!plasma&medium=vacuum@1.0&right=gold-drude@1.0&T=300
 *     &choice=Drude&choice=Plasma;left:!plasma;debye:10&at=38
 *
 * A body lists its layers from the gap outwards (`version:thickness`) and ends with its substrate; `*version` is what lies along
 * the axis of a uniaxial place, `~siemens` a sheet on it. Decoding is total: a part
 * that cannot be read is reported in words, and what stands in its place is said.
 */

export interface AddressProblem {
	/** Name of the query parameter. */
	part: string;
	message: string;
}

export interface DecodedStudy {
	study: Study;
	problems: AddressProblem[];
}

type Report = (part: string, message: string) => void;

const NUMBER = /^\d+(\.\d+)?(e[+-]?\d+)?$/i;
const UNIT_NM: Record<string, number> = { '': 1, nm: 1, um: 1000, A: 0.1 };

/** `version*along-the-normal~sheet-in-siemens!rule`, all but the first where they stand. */
function decodeMaterial(text: string): SlotMaterial | string {
	const [named, ruleText, ...rest] = text.split('!');
	if (rest.length > 0) return `"${text}" names more than one rule for the static term`;
	const [versions, sheetText, ...sheets] = named.split('~');
	const [version, normal, ...axes] = versions.split('*');
	if (sheets.length > 0 || axes.length > 0) return `"${text}" names more than one axis or sheet`;
	for (const one of [version, normal ?? version])
		if (!versionRef.safeParse(one).success)
			return `"${one}" is not the name of a version (slug@major.minor, as gold-drude@1.0)`;
	const { min, max } = SHEET_RANGE_SIEMENS;
	const sheetSiemens = sheetText === undefined ? undefined : decodeNumber(sheetText, min, max);
	if (sheetText !== undefined && sheetSiemens === undefined)
		return `"${sheetText}" is not a conductivity of a sheet between ${min} and ${max} S`;
	const rule = ruleText === undefined ? undefined : zeroFrequencyRule.safeParse(ruleText);
	if (rule && !rule.success) return `"${ruleText}" is not drude, plasma, ideal, dcCounted or dcIgnored`;
	return {
		version,
		...(normal === undefined ? {} : { normal }),
		...(sheetSiemens === undefined ? {} : { sheetSiemens }),
		...(rule ? { zeroFrequency: rule.data } : {})
	};
}

function decodeThickness(text: string): number | undefined {
	const [, digits = '', unit = ''] = /^([\d.eE+-]+?)(nm|um|A)?$/.exec(text) ?? [];
	if (!NUMBER.test(digits)) return undefined;
	const value = Number(digits) * UNIT_NM[unit];
	return value >= THICKNESS_RANGE_NM.min && value <= THICKNESS_RANGE_NM.max ? value : undefined;
}

function decodeBody(text: string): StudyBody | string {
	const items = text.split(',');
	const substrate = decodeMaterial(items[items.length - 1]);
	if (typeof substrate === 'string') return substrate;
	const layers = [];
	for (const item of items.slice(0, -1)) {
		const colon = item.lastIndexOf(':');
		const of = decodeMaterial(colon < 0 ? item : item.slice(0, colon));
		if (typeof of === 'string') return of;
		const thicknessNm = decodeThickness(colon < 0 ? '' : item.slice(colon + 1));
		if (thicknessNm === undefined) return `the layer "${item}" needs a thickness, as ${of.version}:20nm`;
		layers.push({ of, thicknessNm });
	}
	return layers.length > 40 ? 'more than 40 layers' : { layers, substrate };
}

function decodeChange(text: string): SlotChange | string {
	const [version, ruleText, ...rest] = text.split('!');
	const change: SlotChange = {};
	if (version !== '') {
		if (!versionRef.safeParse(version).success) return `"${version}" is not the name of a version`;
		change.version = version;
	}
	if (ruleText !== undefined) {
		const parsed = zeroFrequencyRule.safeParse(ruleText);
		if (!parsed.success && ruleText !== 'written')
			return `"${ruleText}" is not drude, plasma, ideal or written`;
		change.zeroFrequency = parsed.success ? parsed.data : 'written';
	}
	return rest.length > 0 || Object.keys(change).length === 0 ? `"${text}" changes nothing` : change;
}

function decodeName(text: string): string {
	return text.replace(/%(25|3B)/g, decodeURIComponent).slice(0, CHOICE_NAME_MAX);
}

function decodeChoice(text: string, exists: (slot: string) => boolean, report: Report): ModelChoice {
	const [name, ...parts] = text.split(';');
	const choice: ModelChoice = { name: decodeName(name), changes: {} };
	for (const part of parts) {
		const colon = part.indexOf(':');
		const place = part.slice(0, Math.max(0, colon));
		const value = part.slice(colon + 1);
		if (place === 'debye') {
			const length = decodeNumber(value, 0.1, 1e6);
			if (value === 'none' || value === 'off') choice.debyeLengthNm = value;
			else if (length === undefined)
				report('choice', `"${part}" is not a Debye length in nm; it was left out`);
			else choice.debyeLengthNm = length;
		} else if (!slotName.safeParse(place).success || !exists(place)) {
			report('choice', `the arrangement has no place "${place || part}"; this change was left out`);
		} else {
			const change = decodeChange(value);
			if (typeof change === 'string') report('choice', `${change}; this change was left out`);
			else choice.changes[place] = change;
		}
	}
	return choice;
}

function decodeMarks(texts: string[], report: Report): StudyMark[] {
	if (texts.length > MARKS_MAX) report('mark', `only the first ${MARKS_MAX} marks were taken`);
	return texts.slice(0, MARKS_MAX).flatMap((text) => {
		const colon = text.lastIndexOf(':');
		const label = text.slice(0, Math.max(0, colon)).slice(0, MARK_LABEL_MAX);
		const separationNm = decodeThickness(text.slice(colon + 1));
		if (label !== '' && separationNm !== undefined) return [{ label, separationNm }];
		report('mark', `"${text}" is not a name with a length, as contact:0.3nm; it was left out`);
		return [];
	});
}

function decodeNumber(text: string, min: number, max: number): number | undefined {
	const value = NUMBER.test(text) ? Number(text) : NaN;
	return value >= min && value <= max ? value : undefined;
}

/** The study an address means. Without a body or medium in the address it is the worked arrangement. */
export function decodeStudy(query: URLSearchParams, usual: Study = WORKED_STUDY): DecodedStudy {
	const problems: AddressProblem[] = [];
	const report: Report = (part, message) => problems.push({ part, message });

	function read<T>(part: string, usual: T, decode: (text: string) => T | string): T {
		const text = query.get(part);
		if (text === null) return usual;
		const value = decode(text);
		// A string is always a complaint here: no part decodes to a bare string but `against` and `show`, which wrap theirs.
		if (typeof value !== 'string') return value;
		report(part, `${value}; what usually stands here was taken instead`);
		return usual;
	}

	function readNumber<T>(part: string, usual: T, min: number, max: number, unit: string): number | T {
		return read<number | T>(
			part,
			usual,
			(text) =>
				decodeNumber(text, min, max) ?? `"${text}" is not a number of ${unit} between ${min} and ${max}`
		);
	}

	const named = ['left', 'medium', 'right'].some((part) => query.has(part));
	const left = read('left', usual.left, decodeBody);
	const medium = read('medium', usual.medium, decodeMaterial);
	const right = read('right', usual.right, decodeBody);
	const shape = read('shape', usual.shape, decodeShape);
	const temperatureK = query.get('T') === '0' ? 0 : readTemperature();
	const debyeLengthNm = readNumber('debye', undefined, 0.1, 1e6, 'nm');

	function readTemperature() {
		return readNumber('T', usual.temperatureK, TEMPERATURE_RANGE_K.min, TEMPERATURE_RANGE_K.max, 'K');
	}

	const { min, max } = SEPARATION_RANGE_NM;
	let fromNm = readNumber('from', usual.fromNm, min, max, 'nm');
	let toNm = readNumber('to', usual.toNm, min, max, 'nm');
	if (!(toNm >= 1.5 * fromNm)) {
		report(
			'to',
			`the range ${fromNm} to ${toNm} nm is empty; ${usual.fromNm} to ${usual.toNm} nm was taken instead`
		);
		({ fromNm, toNm } = usual);
	}
	const inside = (value: number) => Math.min(toNm, Math.max(fromNm, value));
	const shown = read('show', { is: usual.quantity }, (text) => {
		const parsed = quantity.safeParse(text);
		if (!parsed.success) return `"${text}" is not pressure, energy, gradient or force`;
		return parsed.data === 'force' && shape.kind === 'plates'
			? 'plates have no total force'
			: { is: parsed.data };
	});

	const bare: Study = {
		...{ left, medium, right, shape, temperatureK, fromNm, toNm, quantity: shown.is },
		...decodeConditions(query, debyeLengthNm, report),
		choices: [{ name: '', changes: {} }],
		atNm: inside(readNumber('at', usual.atNm, min, max, 'nm')),
		marks: decodeMarks(query.getAll('mark'), report),
		against: 'ideal'
	};
	const parkedNm = readNumber('parked', undefined, min, max, 'nm');
	if (parkedNm !== undefined) bare.parkedNm = inside(parkedNm);

	const exists = (slot: string) => materialAt(bare, slot) !== undefined;
	const choices = query.getAll('choice').map((text) => decodeChoice(text, exists, report));
	if (choices.length > CHOICES_MAX)
		report('choice', `only the first ${CHOICES_MAX} model choices were taken`);
	if (choices.length > 0) bare.choices = choices.slice(0, CHOICES_MAX);
	else if (!named) bare.choices = usual.choices;
	bare.against = readAgainst(query.get('against'), bare.choices.length, report);

	const parsed = studySchema.safeParse(bare);
	if (parsed.success) return { study: parsed.data, problems };
	report('', 'this address does not describe a study; the worked arrangement stands instead');
	return { study: usual, problems };
}

function readAgainst(text: string | null, choices: number, report: Report): Study['against'] {
	if (text === null || text === 'ideal') return 'ideal';
	if (/^[0-4]$/.test(text) && Number(text) < choices) return Number(text);
	report(
		'against',
		`there is no model choice "${text}" to compare with; ideal conductors were taken instead`
	);
	return 'ideal';
}
