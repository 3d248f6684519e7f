import type { ForcePoint, Parts } from '../engine/contract.ts';
import type { Quantity } from '../schemas/study.ts';

/** Results of the engine as columns that the strips draw: one entry a separation, ascending. */

export interface Series {
	separationsNm: number[];
	values: number[];
	/** Relative to the value beside it. */
	bounds: number[];
	/** False where the accuracy asked for was not reached. */
	met: boolean[];
}

interface Reading {
	value: number;
	bound: number;
	parts: Parts | undefined;
}

/** Value, bound and breakdown of the chosen quantity at one point; undefined where the shape has no such quantity. */
export function readingOf(point: ForcePoint, quantity: Quantity): Reading | undefined {
	const { errorBound, breakdown } = point;
	switch (quantity) {
		case 'pressure':
			return { value: point.pressurePa, bound: errorBound.pressure, parts: breakdown?.pressurePa };
		case 'energy':
			return {
				value: point.freeEnergyJPerM2,
				bound: errorBound.freeEnergy,
				parts: breakdown?.freeEnergyJPerM2
			};
		case 'gradient':
			return {
				value: point.pressureGradientPaPerM,
				bound: errorBound.pressureGradient,
				parts: breakdown?.pressureGradientPaPerM
			};
		case 'force':
			// The proximity rule makes the force from free energy or pressure; the larger bound covers both.
			return point.forceN === undefined
				? undefined
				: {
						value: point.forceN,
						bound: Math.max(errorBound.freeEnergy, errorBound.pressure),
						parts: undefined
					};
	}
}

const ascending = (points: readonly (ForcePoint | undefined)[]) =>
	points.filter((point) => point !== undefined).sort((one, other) => one.separationNm - other.separationNm);

/** Points that have arrived, in any order and with holes, as one ascending series. */
export function seriesOf(points: readonly (ForcePoint | undefined)[], quantity: Quantity): Series {
	const series: Series = { separationsNm: [], values: [], bounds: [], met: [] };
	for (const point of ascending(points)) {
		const reading = readingOf(point, quantity);
		if (!reading) continue;
		series.separationsNm.push(point.separationNm);
		series.values.push(reading.value);
		series.bounds.push(reading.bound);
		series.met.push(point.met);
	}
	return series;
}

export interface Shares {
	separationsNm: number[];
	/** Of the n = 0 term in the sum of magnitudes. */
	static: number[];
	/** Of TE in the sum of magnitudes. */
	te: number[];
}

const EMPTY: Parts = { zeroTe: 0, zeroTm: 0, te: 0, tm: 0 };

/**
 * Shares of the parts, taken over the sum of magnitudes: where parts of both signs meet, a share of the total would run
 * beyond 0 and 1 and blow up where the total vanishes.
 */
export function sharesOf(points: readonly (ForcePoint | undefined)[], quantity: Quantity): Shares {
	const shares: Shares = { separationsNm: [], static: [], te: [] };
	for (const point of ascending(points)) {
		// A force is the energy or an integral of the pressure: its shares are those of the pressure to good measure.
		const parts = readingOf(point, quantity === 'force' ? 'energy' : quantity)?.parts;
		if (!parts) continue;
		const { zeroTe, zeroTm, te, tm } = { ...EMPTY, ...parts };
		const magnitude = Math.abs(zeroTe) + Math.abs(zeroTm) + Math.abs(te) + Math.abs(tm);
		if (magnitude === 0) continue;
		shares.separationsNm.push(point.separationNm);
		shares.static.push((Math.abs(zeroTe) + Math.abs(zeroTm)) / magnitude);
		shares.te.push((Math.abs(zeroTe) + Math.abs(te)) / magnitude);
	}
	return shares;
}

/** Index of the last separation at or below d, held so that it and its successor exist; -1 outside the series. */
export function bracket(separationsNm: readonly number[], d: number): number {
	const last = separationsNm.length - 1;
	if (last < 1 || d < separationsNm[0] * (1 - 1e-12) || d > separationsNm[last] * (1 + 1e-12)) return -1;
	let low = 0;
	let high = last;
	while (high - low > 1) {
		const middle = (low + high) >> 1;
		if (separationsNm[middle] <= d) low = middle;
		else high = middle;
	}
	return low;
}

/**
 * Value of a curve between its points: a power law where both neighbours have one sign, a straight line on the log axis
 * where the sign changes. For drawing and for the moment of a drag only; a quoted number is computed at its separation.
 */
export function interpolate(
	separationsNm: readonly number[],
	values: readonly number[],
	d: number
): number | undefined {
	const index = bracket(separationsNm, d);
	if (index < 0) return undefined;
	const [a, b] = [values[index], values[index + 1]];
	const t = Math.log(d / separationsNm[index]) / Math.log(separationsNm[index + 1] / separationsNm[index]);
	if (a * b > 0) return a * Math.exp(t * Math.log(b / a));
	return a + t * (b - a);
}

/** Mean exponent between two separations: the power law that joins the two values; undefined across a change of sign. */
export function meanExponent(d1: number, v1: number, d2: number, v2: number): number | undefined {
	return d1 === d2 || !(v1 * v2 > 0) ? undefined : Math.log(v2 / v1) / Math.log(d2 / d1);
}
