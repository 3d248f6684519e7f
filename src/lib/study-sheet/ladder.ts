import type { Study } from '../schemas/study.ts';

/** One parameter swept at one separation: the arrangement for each of its values, and what to mark on the curve. */

export type Rung =
	{ kind: 'temperature' } | { kind: 'salt' } | { kind: 'thickness'; side: 'left' | 'right'; layer: number };

/** Beyond this a film stands for a body of its own: the bulk limit. */
export const BULK_NM = 1e5;

/** What a study can be swept over: temperature, salt, and each of its layers. */
export function rungsOf(study: Study): Rung[] {
	const layers = (['left', 'right'] as const).flatMap((side) =>
		study[side].layers.map((_, layer): Rung => ({ kind: 'thickness', side, layer }))
	);
	return [...layers, { kind: 'temperature' }, { kind: 'salt' }];
}

export function withRung(study: Study, rung: Rung, value: number): Study {
	switch (rung.kind) {
		case 'temperature':
			return { ...study, temperatureK: value };
		case 'salt': {
			const { debyeLengthNm: _debye, ions: _ions, ...rest } = study;
			return { ...rest, salt: { molPerL: value, valence: study.salt?.valence ?? 1 } };
		}
		case 'thickness': {
			const { side, layer } = rung;
			const layers = study[side].layers.map((one, place) =>
				place === layer ? { ...one, thicknessNm: value } : one
			);
			return { ...study, [side]: { ...study[side], layers } };
		}
	}
}

/** Evenly on the axis of the parameter: linear for temperature, logarithmic for lengths and concentrations. */
export function rungValues({ kind }: Rung, from: number, to: number, count: number): number[] {
	return Array.from({ length: count }, (_, step) => {
		const share = step / (count - 1);
		const value = kind === 'temperature' ? from + share * (to - from) : from * (to / from) ** share;
		return Number(value.toPrecision(6));
	});
}

export const RUNG_RANGES: Record<Rung['kind'], { from: number; to: number; unit: string }> = {
	temperature: { from: 250, to: 400, unit: 'K' },
	salt: { from: 1e-4, to: 1, unit: 'mol/L' },
	thickness: { from: 1, to: 300, unit: 'nm' }
};

/** The smallest value from which on everything stays within this share of the limit; null where nothing does. */
export function settledFrom(
	values: readonly number[],
	results: readonly number[],
	limit: number,
	share = 0.01
): number | null {
	let settled: number | null = null;
	for (let place = values.length - 1; place >= 0; place -= 1) {
		if (!(Math.abs(results[place] - limit) <= share * Math.abs(limit))) break;
		settled = values[place];
	}
	return settled;
}

/** Where the sign turns, between two values with results of opposite sign, by a straight line on the axis. */
export function turningPoints(
	values: readonly number[],
	results: readonly number[],
	axis: 'linear' | 'logarithmic'
): number[] {
	return values.slice(1).flatMap((value, place) => {
		const [before, after] = [results[place], results[place + 1]];
		if (!(before * after < 0)) return [];
		const share = before / (before - after);
		const start = values[place];
		return axis === 'linear' ? [start + share * (value - start)] : [start * (value / start) ** share];
	});
}
