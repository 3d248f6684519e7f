import type { ForcePoint } from '../engine/contract.ts';
import type { Quantity } from '../schemas/study.ts';
import { interpolate, type Series } from './series.ts';

/** What stated uncertainties of the data do to a curve: one standard deviation to either side, apart from the bound. */

/** Standard uncertainty of a quantity, at few separations. */
export interface Deviations {
	separationsNm: number[];
	values: number[];
}

/** Lower and upper magnitude at the separations of a curve. */
export interface Band {
	separationsNm: number[];
	low: number[];
	high: number[];
}

/** Where the engine gives one: not of the gradient, nor of forces that are an integral over a cylinder. */
function deviationOf(point: ForcePoint, quantity: Quantity): number | undefined {
	const { uncertainty, freeEnergyJPerM2, forceN } = point;
	if (uncertainty === undefined || uncertainty.contributions.length === 0) return undefined;
	if (quantity === 'pressure') return uncertainty.pressurePa.value;
	if (quantity === 'energy') return uncertainty.freeEnergyJPerM2.value;
	if (quantity !== 'force' || forceN === undefined || freeEnergyJPerM2 === 0) return undefined;
	const factor = forceN / freeEnergyJPerM2;
	return factor > 0 ? factor * uncertainty.freeEnergyJPerM2.value : undefined;
}

/** Deviations that have arrived, ascending; null where nothing is stated about the data, or nothing of this quantity. */
export function deviationsOf(
	points: readonly (ForcePoint | undefined)[],
	quantity: Quantity,
	perLength: boolean
): Deviations | null {
	if (perLength && quantity === 'force') return null;
	const found = points
		.filter((point) => point !== undefined)
		.flatMap((point) => {
			const value = deviationOf(point, quantity);
			return value === undefined || value === 0 ? [] : [{ separationNm: point.separationNm, value }];
		})
		.sort((one, other) => one.separationNm - other.separationNm);
	if (found.length < 2) return null;
	return {
		separationsNm: found.map(({ separationNm }) => separationNm),
		values: found.map(({ value }) => value)
	};
}

/** Ends of two grids over the same range may differ in their last digit. */
const SAME = 1e-9;

/** A deviation between those computed, where it goes like a power of the separation; nothing outside them. */
export function deviationAt({ separationsNm, values }: Deviations, atNm: number): number | undefined {
	const [first, last] = [separationsNm[0], separationsNm[separationsNm.length - 1]];
	if (Math.abs(atNm / first - 1) < SAME) return values[0];
	if (Math.abs(atNm / last - 1) < SAME) return values[values.length - 1];
	return interpolate(separationsNm, values, atNm);
}

/** The band around a curve, where its deviations reach; a lower edge of zero where the sign is open. */
export function bandOf(series: Series, deviations: Deviations | null): Band | null {
	if (deviations === null) return null;
	const band: Band = { separationsNm: [], low: [], high: [] };
	series.separationsNm.forEach((nm, index) => {
		const deviation = deviationAt(deviations, nm);
		if (deviation === undefined) return;
		const size = Math.abs(series.values[index]);
		band.separationsNm.push(nm);
		band.low.push(Math.max(0, size - deviation));
		band.high.push(size + deviation);
	});
	return band.separationsNm.length > 1 ? band : null;
}
