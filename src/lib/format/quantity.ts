import { numberLine, numberText, type NumberText } from './number.ts';

/** Physical values with a unit chosen for the reader; what is stored stays in the unit of its name. */

interface Unit {
	symbol: string;
	/** How many base units one of these is. */
	size: number;
}

/** Units of a quantity from small to large; the first is used below its size too. */
export type UnitScale = readonly Unit[];

export const SEPARATION: UnitScale = [
	{ symbol: 'nm', size: 1 },
	{ symbol: 'µm', size: 1e3 },
	{ symbol: 'mm', size: 1e6 }
];

export const PRESSURE: UnitScale = [
	{ symbol: 'pPa', size: 1e-12 },
	{ symbol: 'nPa', size: 1e-9 },
	{ symbol: 'µPa', size: 1e-6 },
	{ symbol: 'mPa', size: 1e-3 },
	{ symbol: 'Pa', size: 1 },
	{ symbol: 'kPa', size: 1e3 },
	{ symbol: 'MPa', size: 1e6 },
	{ symbol: 'GPa', size: 1e9 }
];

export const FREE_ENERGY: UnitScale = [
	{ symbol: 'pJ/m²', size: 1e-12 },
	{ symbol: 'nJ/m²', size: 1e-9 },
	{ symbol: 'µJ/m²', size: 1e-6 },
	{ symbol: 'mJ/m²', size: 1e-3 },
	{ symbol: 'J/m²', size: 1 }
];

export const FORCE: UnitScale = [
	{ symbol: 'fN', size: 1e-15 },
	{ symbol: 'pN', size: 1e-12 },
	{ symbol: 'nN', size: 1e-9 },
	{ symbol: 'µN', size: 1e-6 },
	{ symbol: 'mN', size: 1e-3 }
];

export const FORCE_GRADIENT: UnitScale = [
	{ symbol: 'nN/m', size: 1e-9 },
	{ symbol: 'µN/m', size: 1e-6 },
	{ symbol: 'mN/m', size: 1e-3 },
	{ symbol: 'N/m', size: 1 }
];

export const PRESSURE_GRADIENT: UnitScale = [
	{ symbol: 'Pa/m', size: 1 },
	{ symbol: 'kPa/m', size: 1e3 },
	{ symbol: 'MPa/m', size: 1e6 },
	{ symbol: 'GPa/m', size: 1e9 },
	{ symbol: 'TPa/m', size: 1e12 }
];

export const ENERGY: UnitScale = [
	{ symbol: 'meV', size: 1e-3 },
	{ symbol: 'eV', size: 1 },
	{ symbol: 'keV', size: 1e3 }
];

export interface QuantityText extends NumberText {
	unit: string;
}

/** The largest unit that leaves at least one before the point after rounding to `digits`. */
export function unitFor(value: number, scale: UnitScale, digits = 3): Unit {
	const magnitude = Number(Math.abs(value).toPrecision(digits));
	let chosen = scale[0];
	for (const unit of scale) if (magnitude >= unit.size) chosen = unit;
	return chosen;
}

export function quantityText(value: number, scale: UnitScale, digits = 3): QuantityText {
	const unit = unitFor(value, scale, digits);
	return { ...numberText(value / unit.size, digits), unit: unit.symbol };
}

export function quantityLine(value: number, scale: UnitScale, digits = 3): string {
	const unit = unitFor(value, scale, digits);
	return `${numberLine(value / unit.size, digits)} ${unit.symbol}`;
}

/** The word that stands beside every signed force. */
export function signWord(value: number): 'attraction' | 'repulsion' | 'no force' {
	if (value === 0) return 'no force';
	return value < 0 ? 'attraction' : 'repulsion';
}
