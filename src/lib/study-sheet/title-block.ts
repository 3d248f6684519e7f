import { numberLine, percent } from '../format/number.ts';
import { quantityLine, type UnitScale } from '../format/quantity.ts';
import { materialIn, slotsOf } from '../schemas/study-slots.ts';
import type { ModelChoice, Study } from '../schemas/study.ts';
import { ruleWords } from './conduction.ts';
import type { Reading } from './readings.ts';
import { relianceAt, type VersionFacts } from './version-facts.ts';

/** What a number rests on, in words: used by the page, by print and inside every exported picture. */

const C = 299792458;

/** rad/s; the frequency that matters most at a separation, c/2d. */
export const tellingFrequency = (separationNm: number): number => C / (2 * separationNm * 1e-9);

/** The first digits of a checksum, as a drawing carries them. */
export const shortChecksum = (checksum: string): string => checksum.replace(/^sha256:/, '').slice(0, 7);

export interface Ingredient {
	facts: VersionFacts;
	/** Letters of the choices that use it; empty when all do. */
	letters: string[];
}

/** Versions in the order of the drawing, each once, with the choices that use it. */
export function ingredients(
	study: Study,
	facts: Record<string, VersionFacts>,
	letters: readonly string[]
): Ingredient[] {
	const used = new Map<string, Set<string>>();
	for (const slot of slotsOf(study)) {
		study.choices.forEach((choice, index) => {
			const material = materialIn(study, choice, slot);
			for (const version of [material?.version, material?.normal])
				if (version) used.set(version, (used.get(version) ?? new Set()).add(letters[index]));
		});
	}
	return [...used].flatMap(([version, by]) => {
		const known = facts[version];
		return known ? [{ facts: known, letters: by.size === study.choices.length ? [] : [...by] }] : [];
	});
}

/** How each conductor's static term is taken in one choice, "Gold: Drude, as the model is written". */
export function conductionWords(
	study: Study,
	choice: ModelChoice,
	facts: Record<string, VersionFacts>
): string[] {
	const words = slotsOf(study).flatMap((slot) => {
		const material = materialIn(study, choice, slot);
		const known = material && facts[material.version];
		if (!material || !known) return [];
		const { sheetSiemens, zeroFrequency: rule } = material;
		const sheet =
			sheetSiemens === undefined
				? []
				: [`${known.material.name}: like a metal, by its sheet of ${Number(sheetSiemens.toPrecision(3))} S`];
		if (known.staticLimit === 'finite' && !rule) return sheet;
		return [
			...sheet,
			`${known.material.name}: ${ruleWords(rule ?? known.staticLimit)}${rule ? ', chosen' : ', as the model is written'}`
		];
	});
	return [...new Set(words)];
}

/** Where the data end: the share of eps(i xi) at c/2d that lies outside the measured table. */
export function relianceWords(used: readonly Ingredient[], separationNm: number): string[] {
	return used.flatMap(({ facts }) => {
		const share = relianceAt(facts, tellingFrequency(separationNm));
		return share === undefined ? [] : [`${percent(share)} of ${facts.material.name}`];
	});
}

export function boundWords(value: number, bound: number | null, scale: UnitScale): string {
	if (bound === null) return 'being computed';
	if (bound === 0) return 'exact';
	return `${quantityLine(Math.abs(value) * bound, scale, 2)}, ${numberLine(bound, 1)} of the value`;
}

/** "Silica, fused" sorts well in a list; in a sentence it is silica. */
export const plainName = (name: string): string => name.split(',')[0];

/** Title of a study, made from what stands in it: "Gold against silica, in bromobenzene". */
export function studyTitle(study: Study, facts: Record<string, VersionFacts>): string {
	const name = (version: string) => plainName(facts[version]?.material.name ?? version);
	const lower = (text: string) =>
		/^[A-Z][a-z]/.test(text) ? text.slice(0, 1).toLowerCase() + text.slice(1) : text;
	const body = (side: 'left' | 'right') => {
		const { layers, substrate } = study[side];
		const surface = layers[0];
		return surface
			? `${name(surface.of.version)} on ${lower(name(substrate.version))}`
			: name(substrate.version);
	};
	const medium = lower(name(study.medium.version));
	return `${body('left')} against ${lower(body('right'))}, ${medium === 'vacuum' ? 'across vacuum' : `in ${medium}`}`;
}

/** Everything of the block that is not read off the curves. */
export interface TitleFacts {
	heading: string;
	atNm: number;
	spread: { low: number; high: number } | null;
	ingredients: Ingredient[];
	/** One entry where choices differ, else one for all with no letters. */
	conduction: { letters: string; words: string }[];
	reliance: string[];
	conditions: string;
	engine: string;
	/** ISO, in UTC; empty before anything is computed. */
	computedAt: string;
	worst: string;
	percent(share: number): string;
}

/** Conduction of all choices, gathered where they agree. */
export function conductionOfAll(
	study: Study,
	facts: Record<string, VersionFacts>,
	letters: readonly string[]
): { letters: string; words: string }[] {
	const gathered = new Map<string, string[]>();
	study.choices.forEach((choice, index) => {
		for (const words of conductionWords(study, choice, facts)) {
			gathered.set(words, [...(gathered.get(words) ?? []), letters[index]]);
		}
	});
	return [...gathered].map(([words, by]) => ({
		words,
		letters: by.length === study.choices.length ? '' : by.join(', ')
	}));
}

function ionWords({ debyeLengthNm, salt, ions }: Study): string {
	if (debyeLengthNm !== undefined) return `Debye length ${debyeLengthNm} nm`;
	if (salt) return `salt ${salt.molPerL} mol/L, ${salt.valence}:${salt.valence}`;
	return ions === 'off' ? 'static TM term left out' : 'no ions';
}

/** Shape, temperature, ions and roughness in one line. */
export function conditionWords(study: Study, shapeName: string): string {
	const { shape, temperatureK, roughness } = study;
	const radii = Object.entries(shape).flatMap(([field, value]) =>
		typeof value === 'number'
			? [
					`${field.startsWith('left') ? 'left ' : field.startsWith('right') ? 'right ' : ''}radius ${value} µm`
				]
			: []
	);
	const parts = [[shapeName, ...radii].join(', '), `${temperatureK} K`];
	parts.push(ionWords(study));
	if (roughness) {
		const { leftNm, rightNm } = roughness;
		parts.push(`roughness ${leftNm ?? 0} nm left, ${rightNm ?? 0} nm right (rms)`);
	}
	return parts.join('; ');
}

/** The block as lines of text, for the exported picture and the head of a CSV file. */
export function blockLines(
	title: TitleFacts,
	readings: readonly Reading[],
	scale: UnitScale,
	word: (value: number) => string,
	address: string
): string[] {
	const values = readings.map(
		({ letter, value, bound }) =>
			`${letter}: ${quantityLine(value, scale, 4)}, ${word(value)}; numerical bound ${boundWords(value, bound, scale)}`
	);
	const inputs = title.ingredients.map(
		({ facts, letters }) =>
			`${facts.material.name}, ${facts.datasetTitle}, version ${facts.number} (${facts.quality}) ${shortChecksum(facts.checksum)}${letters.length > 0 ? `, choice ${letters.join(', ')}` : ''}`
	);
	const { spread } = title;
	return [
		`${title.heading} at ${title.atNm} nm; ${title.conditions}`,
		...values,
		...(spread
			? [
					`Between model choices: ${quantityLine(spread.low, scale, 4)} to ${quantityLine(spread.high, scale, 4)}`
				]
			: []),
		...inputs,
		...title.conduction.map(
			({ letters, words }) => `${letters ? `${letters}: ` : ''}static term of ${words}`
		),
		...(title.reliance.length > 0
			? [`Rests on extrapolation, of eps(i xi) at c/2d: ${title.reliance.join(', ')}`]
			: []),
		`Worst state among inputs: ${title.worst}; engine ${title.engine}; ${title.computedAt.slice(0, 10) || 'not computed'}`,
		address
	];
}
