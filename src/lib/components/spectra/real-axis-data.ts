import type { EnergyRangeEv, Spectrum } from '../../schemas/version.ts';
import { wavelengthUmOfEnergy } from './frequency.ts';

/** Spectra on the real axis as columns to draw: which quantity, over what, cut at the ends of the measured range. */

export type RealQuantity = 'n' | 'k' | 'epsilon1' | 'epsilon2';
export type Abscissa = 'energy' | 'wavelength';

/** The two panels that are shown together. */
export const PANELS = { nk: ['n', 'k'], epsilon: ['epsilon1', 'epsilon2'] } as const;
export type Panels = keyof typeof PANELS;

/** One dataset as the real-axis plot draws it. */
export interface RealSeries {
	slug: string;
	title: string;
	letter: string;
	ink: number;
	measuredRangeEv: EnergyRangeEv | null;
	real: NonNullable<Spectrum['real']>;
	points: Spectrum['points'];
}

export interface Columns {
	energyEv: number[];
	values: number[];
}

export function abscissaOf(energyEv: number, abscissa: Abscissa): number {
	return abscissa === 'energy' ? energyEv : wavelengthUmOfEnergy(energyEv);
}

/** The curve inside the measured range and outside of it; both carry the points at the cuts, so that no gap shows. */
export function splitAtRange(
	series: Pick<RealSeries, 'real' | 'measuredRangeEv'>,
	quantity: RealQuantity
): { measured: Columns; below: Columns; above: Columns } {
	const { energyEv } = series.real;
	const values = series.real[quantity];
	const range = series.measuredRangeEv;
	const take = (from: number, to: number): Columns => {
		const start = Math.max(0, from);
		return { energyEv: energyEv.slice(start, to + 1), values: values.slice(start, to + 1) };
	};
	const last = energyEv.length - 1;
	if (range === null) return { measured: take(0, -1), below: take(0, last), above: take(0, -1) };
	const firstInside = energyEv.findIndex((energy) => energy >= range.low);
	const afterInside = energyEv.findIndex((energy) => energy > range.high);
	const first = firstInside === -1 ? last + 1 : firstInside;
	const end = afterInside === -1 ? last : afterInside - 1;
	if (end < first) return { measured: take(0, -1), below: take(0, last), above: take(0, -1) };
	return {
		measured: take(first, end),
		below: first === 0 ? take(0, -1) : take(0, first),
		above: end === last ? take(0, -1) : take(end, last)
	};
}

/** Measured points of one quantity; null where the file did not give it. */
export function pointColumns(series: RealSeries, quantity: RealQuantity): Columns | null {
	const values = series.points?.[quantity] ?? null;
	return series.points === null || values === null ? null : { energyEv: series.points.energyEv, values };
}

/** What is shown first: the measured ranges with some of what is beside them, and the visible with its neighbours always. */
const MARGIN = 4;
const ALWAYS = { low: 0.1, high: 20 };
const WHOLE = { low: 1e-2, high: 1e2 };

export function shownRange(series: readonly Pick<RealSeries, 'real' | 'measuredRangeEv'>[]): EnergyRangeEv {
	const ranges = series.flatMap((one) => (one.measuredRangeEv === null ? [] : [one.measuredRangeEv]));
	const given = series.flatMap((one) => [
		one.real.energyEv[0],
		one.real.energyEv[one.real.energyEv.length - 1]
	]);
	if (given.length === 0) return WHOLE;
	const [first, last] = [Math.min(...given), Math.max(...given)];
	if (ranges.length === 0) return { low: Math.max(first, WHOLE.low), high: Math.min(last, WHOLE.high) };
	return {
		low: Math.max(first, Math.min(ALWAYS.low, ...ranges.map((range) => range.low / MARGIN))),
		high: Math.min(last, Math.max(ALWAYS.high, ...ranges.map((range) => range.high * MARGIN)))
	};
}

/** Lowest and highest value of a quantity inside the shown range. */
export function valueRange(
	series: readonly Pick<RealSeries, 'real'>[],
	quantity: RealQuantity,
	shown: EnergyRangeEv
): { low: number; high: number } | null {
	let found: { low: number; high: number } | null = null;
	for (const { real } of series) {
		real.energyEv.forEach((energy, index) => {
			const value = real[quantity][index];
			if (energy < shown.low || energy > shown.high || !Number.isFinite(value)) return;
			found =
				found === null
					? { low: value, high: value }
					: { low: Math.min(found.low, value), high: Math.max(found.high, value) };
		});
	}
	return found;
}
