import { differenceFrom } from './comparison.ts';
import { interpolate, type Series } from './series.ts';

/** Who disagrees with whom, and where. */

export interface Disagreement {
	letter: string;
	/** Largest difference from the reference over the drawn range, as a share; null where nothing can be compared. */
	largest: { share: number; atNm: number } | null;
	/** The first separation at which the two have opposite signs. */
	opposedFromNm: number | null;
}

interface Drawn {
	letter: string;
	series: Series;
}

/** Each choice but the reference, over the reference's drawn range. */
export function disagreements(all: readonly Drawn[], reference: number): Disagreement[] {
	const held = all[reference];
	if (!held) return [];
	return all.flatMap(({ letter, series }, index) => {
		if (index === reference) return [];
		const { separationsNm, values } = differenceFrom(series, held.series);
		let largest: Disagreement['largest'] = null;
		values.forEach((share, place) => {
			if (share === undefined || Math.abs(share) <= Math.abs(largest?.share ?? 0)) return;
			largest = { share, atNm: separationsNm[place] };
		});
		const opposed = series.separationsNm.find((separationNm, place) => {
			const other = interpolate(held.series.separationsNm, held.series.values, separationNm);
			return other !== undefined && other * series.values[place] < 0;
		});
		return [{ letter, largest, opposedFromNm: opposed ?? null }];
	});
}

export interface Quartiles {
	least: number;
	lower: number;
	middle: number;
	upper: number;
	most: number;
}

/** Linear between the two values next to a quartile; undefined of nothing. */
export function quartiles(values: readonly number[]): Quartiles | undefined {
	if (values.length === 0) return undefined;
	const sorted = [...values].sort((a, b) => a - b);
	const at = (share: number) => {
		const place = share * (sorted.length - 1);
		const below = Math.floor(place);
		const above = Math.min(sorted.length - 1, below + 1);
		return sorted[below] + (place - below) * (sorted[above] - sorted[below]);
	};
	return { least: at(0), lower: at(0.25), middle: at(0.5), upper: at(0.75), most: at(1) };
}
