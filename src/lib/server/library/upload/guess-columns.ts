import type { ColumnGuess } from '../../../schemas/upload-preview.ts';
import type { AbscissaUnit, Quantity } from '../../../schemas/upload.ts';
import { readNumber } from './number.ts';
import type { Sheet } from './parse.ts';

/** What the columns of a sheet seem to mean: from their headings, else from their place. A guess is shown, never stored. */

const UNITS: [RegExp, AbscissaUnit][] = [
	[/\bev\b/i, 'eV'],
	[/\bnm\b|nanomet/i, 'nm'],
	[/(^|[^a-z])([uµμ]m)\b|micromet|micron/i, 'um'],
	[/cm\s*\^?\(?[-−]1|1\s*\/\s*cm|wavenumber/i, 'cm^-1'],
	[/rad\s*(\/|\*)?\s*s/i, 'rad/s'],
	[/\bhz\b/i, 'Hz']
];

const QUANTITIES: [RegExp, Quantity][] = [
	[/^(eps(ilon)?|ε|e)?[\s_]*\(?\s*i\s*(xi|ξ)/i, 'epsilonImaginary'],
	[/^(eps(ilon)?|ε|e)[\s_]*('|′|1|_?r(e|eal)?\b)(?!')/i, 'epsilon1'],
	[/^(eps(ilon)?|ε|e)[\s_]*(''|"|″|2|_?i(m|mag)?\b)/i, 'epsilon2'],
	[/^re[\s(]*(eps|ε)/i, 'epsilon1'],
	[/^im[\s(]*(eps|ε)/i, 'epsilon2'],
	[/^n\b/i, 'n'],
	[/^(k|kappa|κ)\b/i, 'k']
];

const UNCERTAINTY = /^((sigma|delta|error|err|uncertainty|unc|std|σ|Δ|±)(\s+of\s+|[\s_.(]*)|[sdu][\s_.(]+)/i;

export function guessColumns(sheet: Sheet): ColumnGuess {
	const width = sheet.rows[0].cells.length;
	const headings = Array.from({ length: width }, (_, index) =>
		sheet.headings.map(({ cells }) => cells[index]?.trim() ?? '').filter(Boolean)
	);
	const roles = headings.map((texts, index) => (index === 0 ? 'abscissa' : (quantityIn(texts) ?? '')));
	const named = roles.filter((role) => role !== '' && role !== 'abscissa');
	if (named.length === 0) placeByOrder(roles);
	else markUncertainties(roles, headings);
	return { roles, ...unitOf(sheet, headings[0] ?? []) };
}

function quantityIn(texts: string[]): Quantity | undefined {
	for (const text of texts) {
		const plain = text.replace(/^["'[(]+/, '');
		const found = QUANTITIES.find(([pattern]) => pattern.test(plain));
		if (found && !UNCERTAINTY.test(plain)) return found[1];
	}
	return undefined;
}

/** Without headings: two columns after the first are n and k more often than anything else; one is eps''. */
function placeByOrder(roles: string[]): void {
	if (roles.length === 2) roles[1] = 'epsilon2';
	if (roles.length >= 3) {
		roles[1] = 'n';
		roles[2] = 'k';
	}
}

/** "s_n" after "n" is its uncertainty. */
function markUncertainties(roles: string[], headings: string[][]): void {
	headings.forEach((texts, index) => {
		if (roles[index] !== '') return;
		const owner = texts
			.filter((text) => UNCERTAINTY.test(text))
			.map((text) => quantityIn([text.replace(UNCERTAINTY, '').replace(/\)$/, '')]))
			.map((quantity) => (quantity ? roles.indexOf(quantity) : -1))
			.find((column) => column >= 0);
		if (owner !== undefined) roles[index] = `uncertainty:${owner + 1}`;
	});
}

/** Wavelengths in nm and wavenumbers are told by their size; eV and um overlap and stay a question. */
function unitOf(sheet: Sheet, headings: string[]): Pick<ColumnGuess, 'unit' | 'unitFrom'> {
	const text = headings.join(' ');
	const told = UNITS.find(([pattern]) => pattern.test(text));
	if (told) return { unit: told[1], unitFrom: 'heading' };
	const values = sheet.rows
		.map(({ cells }) => readNumber(cells[0] ?? '', sheet.decimal))
		.flatMap((read) => ('value' in read ? [read.value] : []));
	const [low, high] = [Math.min(...values), Math.max(...values)];
	if (low >= 100 && high <= 30_000) return { unit: 'nm', unitFrom: 'numbers' };
	return { unit: null, unitFrom: null };
}
