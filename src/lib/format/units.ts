import {
	FORCE,
	FORCE_GRADIENT,
	FREE_ENERGY,
	PRESSURE,
	PRESSURE_GRADIENT,
	SEPARATION,
	type UnitScale
} from './quantity.ts';

/** Units that a reader may fix; "auto" lets each number choose its own. Values keep the unit of their name. */

export interface UnitKind {
	/** What the switch is called. */
	label: string;
	/** The unit of stored values. */
	base: string;
	scale: UnitScale;
	/** Those offered besides "auto". */
	offered: readonly string[];
}

const LENGTHS: UnitScale = [{ symbol: 'Å', size: 0.1 }, ...SEPARATION];

export const UNIT_KINDS = {
	length: { label: 'Separation', base: 'nm', scale: LENGTHS, offered: ['nm', 'µm', 'Å'] },
	pressure: { label: 'Pressure', base: 'Pa', scale: PRESSURE, offered: ['Pa', 'mPa', 'kPa'] },
	energy: { label: 'Free energy', base: 'J/m²', scale: FREE_ENERGY, offered: ['J/m²', 'mJ/m²', 'µJ/m²'] },
	gradient: {
		label: 'Pressure gradient',
		base: 'Pa/m',
		scale: PRESSURE_GRADIENT,
		offered: ['Pa/m', 'MPa/m', 'GPa/m']
	},
	force: { label: 'Force', base: 'N', scale: FORCE, offered: ['pN', 'nN', 'µN'] },
	lineForce: {
		label: 'Force per length',
		base: 'N/m',
		scale: FORCE_GRADIENT,
		offered: ['N/m', 'mN/m', 'µN/m']
	}
} satisfies Record<string, UnitKind>;

export type UnitName = keyof typeof UNIT_KINDS;
export type UnitChoices = Partial<Record<UnitName, string>>;

/** The units a number of this kind may be written in: one if the reader fixed it, else all that "auto" chooses from. */
export function scaleFor(name: UnitName, choices: UnitChoices): UnitScale {
	const { scale }: UnitKind = UNIT_KINDS[name];
	const chosen = scale.filter(({ symbol }) => symbol === choices[name]);
	// Å is for those who ask for it: "auto" stays with nm below a nanometre.
	return chosen.length > 0 ? chosen : scale.filter(({ symbol }) => symbol !== 'Å');
}

/** The one unit of an axis: the fixed one, else the base unit. */
export function axisUnit(name: UnitName, choices: UnitChoices): { symbol: string; size: number } {
	const { scale, base }: UnitKind = UNIT_KINDS[name];
	const symbol = choices[name] ?? base;
	return scale.find((unit) => unit.symbol === symbol) ?? { symbol: base, size: 1 };
}

/** Only what is offered survives: the text comes from the reader's own storage and may be old. */
export function readUnitChoices(text: string | null): UnitChoices {
	const choices: UnitChoices = {};
	let stored: unknown;
	try {
		stored = JSON.parse(text ?? '{}');
	} catch {
		return choices;
	}
	if (typeof stored !== 'object' || stored === null) return choices;
	for (const [name, symbol] of Object.entries(stored)) {
		if (!Object.hasOwn(UNIT_KINDS, name)) continue;
		const kind: UnitKind = UNIT_KINDS[name as UnitName];
		if (kind.offered.includes(symbol)) choices[name as UnitName] = symbol;
	}
	return choices;
}
