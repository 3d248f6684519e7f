import type { Shape } from '../engine/contract.ts';
import type { Quantity } from '../schemas/study.ts';
import { interpolate, type Series } from './series.ts';

/** What the comparison strip shows: the ratio to ideal conductors, or the difference from one model choice in per cent. */

/** hbar c in J m, from the exact h and c of the SI. */
const HBAR_C = (6.62607015e-34 / (2 * Math.PI)) * 299792458;

/**
 * Two ideal conductors across vacuum at T = 0 (Casimir 1948): energy per area -pi^2 hbar c/(720 d^3), pressure and gradient
 * by differentiation; force by the proximity rule of the shape. Undefined where that rule is an integral.
 */
export function idealValue(quantity: Quantity, separationNm: number, shape: Shape): number | undefined {
	const d = separationNm * 1e-9;
	const energy = (-(Math.PI ** 2) * HBAR_C) / (720 * d ** 3);
	switch (quantity) {
		case 'energy':
			return energy;
		case 'pressure':
			return (3 * energy) / d;
		case 'gradient':
			return (-12 * energy) / d ** 2;
		case 'force': {
			const radius = effectiveRadius(shape);
			return radius === undefined ? undefined : 2 * Math.PI * radius * energy;
		}
	}
}

/** m; of the shapes whose force is 2 pi R_eff times the energy per area. */
function effectiveRadius(shape: Shape): number | undefined {
	switch (shape.kind) {
		case 'spherePlate':
			return shape.radiusUm * 1e-6;
		case 'spheres':
			return (1e-6 * shape.leftRadiusUm * shape.rightRadiusUm) / (shape.leftRadiusUm + shape.rightRadiusUm);
		case 'crossedCylinders':
			return 1e-6 * Math.sqrt(shape.leftRadiusUm * shape.rightRadiusUm);
		default:
			return undefined;
	}
}

export interface Compared {
	separationsNm: number[];
	values: (number | undefined)[];
}

/** Ratio to ideal conductors; no points where the shape has no closed form. Positive where both have one sign. */
export function ratioToIdeal(series: Series, quantity: Quantity, shape: Shape): Series {
	const ratio: Series = { separationsNm: [], values: [], bounds: [], met: [] };
	series.values.forEach((value, index) => {
		const ideal = idealValue(quantity, series.separationsNm[index], shape);
		if (ideal === undefined) return;
		ratio.separationsNm.push(series.separationsNm[index]);
		ratio.values.push(value / ideal);
		ratio.bounds.push(series.bounds[index]);
		ratio.met.push(series.met[index]);
	});
	return ratio;
}

/** (value - reference)/|reference|, so that "more attractive" is negative whatever the sign; as a share, not in per cent. */
export function differenceFrom(series: Series, reference: Series): Compared {
	return {
		separationsNm: series.separationsNm,
		values: series.values.map((value, index) => {
			const held = interpolate(reference.separationsNm, reference.values, series.separationsNm[index]);
			return held === undefined || held === 0 ? undefined : (value - held) / Math.abs(held);
		})
	};
}

/** Round limits that show the bulk of the lines: the middle 90 % of the values, so that a pole at a zero does not flatten them. */
export function comparisonLimits(all: readonly Compared[], least: number): [number, number] {
	const values = all
		.flatMap(({ values }) => values)
		.filter((value) => value !== undefined && Number.isFinite(value))
		.map(Number)
		.sort((a, b) => a - b);
	if (values.length === 0) return [-least, least];
	const low = Math.min(0, values[Math.floor(values.length * 0.05)]);
	const high = Math.max(0, values[Math.min(values.length - 1, Math.ceil(values.length * 0.95))]);
	const span = Math.max(high - low, least);
	const step = 10 ** Math.floor(Math.log10(span / 2));
	const round =
		[1, 2, 5, 10].map((factor) => factor * step).find((candidate) => span / candidate <= 4) ?? span;
	return [
		Math.floor(low / round + 1e-9) * round,
		Math.ceil(Math.max(high, low + least) / round - 1e-9) * round
	];
}

/** Three to five round values inside the limits. */
export function comparisonTicks([low, high]: readonly [number, number]): number[] {
	const span = high - low;
	const step = 10 ** Math.floor(Math.log10(span / 2));
	const chosen =
		[1, 2, 5, 10].map((factor) => factor * step).find((candidate) => span / candidate <= 4) ?? span;
	const ticks: number[] = [];
	for (let index = Math.ceil(low / chosen - 1e-9); index * chosen <= high * (1 + 1e-9) + 1e-12; index++) {
		ticks.push(Number((index * chosen).toPrecision(12)));
	}
	return ticks;
}
