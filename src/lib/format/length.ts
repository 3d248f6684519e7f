/** Lengths as people type them. */

const UNITS: Record<string, number> = {
	nm: 1,
	Å: 0.1,
	A: 0.1,
	um: 1e3,
	µm: 1e3,
	μm: 1e3,
	micron: 1e3,
	mm: 1e6
};

/** Value in nm of "20", "20 nm", "0,5 µm", "12 Å"; undefined where it is not a length. */
export function parseLengthNm(text: string): number | undefined {
	const [, digits = '', unit = ''] = /^\s*([+\d.,eE-]+?)\s*(nm|Å|A|um|µm|μm|micron|mm)?\s*$/.exec(text) ?? [];
	const value = parseNumber(digits);
	// Going through decimal text keeps 0.02 µm at 20 and not at 20.000000000000004.
	return value === undefined ? undefined : Number((value * UNITS[unit || 'nm']).toPrecision(15));
}

/** A plain number with a point or a comma before the decimals; no grouping, so that "1,234" is never guessed at. */
export function parseNumber(text: string): number | undefined {
	const trimmed = text.trim();
	if (!/^\d+([.,]\d+)?(e[+-]?\d+)?$/i.test(trimmed)) return undefined;
	return Number(trimmed.replace(',', '.'));
}

/** The text of a length in a field: short, and read back to the same value. */
export function lengthText(nm: number): string {
	if (nm >= 1000) return `${Number((nm / 1000).toPrecision(15))} µm`;
	return `${nm} nm`;
}
