import { evFromRadPerS } from '../../engine/units.ts';
import type { EnergyRangeEv, Spectrum } from '../../schemas/version.ts';
import type { LogScale } from '../../study-sheet/log-scale.ts';
import { interpolate } from '../../study-sheet/series.ts';

/** Permittivity on the imaginary axis as curves over log xi: pure, in pixels of the strip. */

/** Below it lies what only the static term sees; above it every body is as good as vacuum. */
export const XI_DOMAIN = [1e13, 1e18] as const;
/** A sample meant for the very end may miss it by rounding. */
const EDGE = 1e-9;

/** One dataset as the stack draws it. */
export interface EpsilonSeries {
	slug: string;
	title: string;
	letter: string;
	/** 1 to 5: colour token. */
	ink: number;
	measuredRangeEv: EnergyRangeEv | null;
	xiRadPerS: readonly number[];
	epsilon: readonly number[];
	/** Part of eps - 1 that rests on extrapolation; null for closed forms. */
	extrapolatedShare: readonly number[] | null;
}

export function epsilonSeries(
	spectrum: Pick<Spectrum, 'imaginary' | 'measuredRangeEv'>,
	drawn: Pick<EpsilonSeries, 'slug' | 'title' | 'letter' | 'ink'>
): EpsilonSeries {
	const { xiRadPerS, epsilon, shares } = spectrum.imaginary;
	const onAxis = xiRadPerS.flatMap((xi, index) =>
		xi >= XI_DOMAIN[0] * (1 - EDGE) && xi <= XI_DOMAIN[1] * (1 + EDGE) ? [index] : []
	);
	return {
		...drawn,
		measuredRangeEv: spectrum.measuredRangeEv,
		xiRadPerS: onAxis.map((index) => xiRadPerS[index]),
		epsilon: onAxis.map((index) => epsilon[index]),
		extrapolatedShare:
			shares === null ? null : onAxis.map((index) => shares.below[index] + shares.above[index])
	};
}

const within = (range: EnergyRangeEv | null, xi: number) =>
	range !== null && evFromRadPerS(xi) >= range.low && evFromRadPerS(xi) <= range.high;

const fixed = (value: number) => value.toFixed(1);

/** The curve cut where hbar xi enters and leaves the measured range; the cut itself belongs to both parts. */
export function epsilonPaths(
	series: EpsilonSeries,
	x: LogScale,
	y: (epsilon: number) => number
): { measured: string; extrapolated: string } {
	const paths = { measured: '', extrapolated: '' };
	let before: { point: string; part: keyof typeof paths } | null = null;
	series.xiRadPerS.forEach((xi, index) => {
		if (xi < x.min * (1 - EDGE) || xi > x.max * (1 + EDGE)) return;
		const point = `${fixed(x.at(xi))} ${fixed(y(series.epsilon[index]))}`;
		const part = within(series.measuredRangeEv, xi) ? 'measured' : 'extrapolated';
		if (before === null) paths[part] += `M${point}`;
		else if (before.part === part) paths[part] += `L${point}`;
		else {
			paths[before.part] += `L${point}`;
			paths[part] += `M${point}`;
		}
		before = { point, part };
	});
	return paths;
}

/** A power law of eps - 1 between two samples: exact for the tails of every model, and close between them. */
export function epsilonAt(
	series: Pick<EpsilonSeries, 'xiRadPerS' | 'epsilon'>,
	xi: number
): number | undefined {
	const susceptibility = interpolate(
		series.xiRadPerS,
		series.epsilon.map((value) => value - 1),
		xi
	);
	return susceptibility === undefined ? undefined : susceptibility + 1;
}

export function extrapolatedShareAt(series: EpsilonSeries, xi: number): number | undefined {
	return series.extrapolatedShare === null
		? undefined
		: interpolate(series.xiRadPerS, series.extrapolatedShare, xi);
}

export interface Ratio {
	xiRadPerS: number[];
	/** eps of the first over eps of the second, less one, in per cent. */
	percent: number[];
}

/** The first against the second, on the samples of the first that the second reaches too. */
export function ratioOf(first: EpsilonSeries, second: EpsilonSeries): Ratio {
	const ratio: Ratio = { xiRadPerS: [], percent: [] };
	first.xiRadPerS.forEach((xi, index) => {
		const other = epsilonAt(second, xi);
		if (other === undefined || other <= 0) return;
		ratio.xiRadPerS.push(xi);
		ratio.percent.push((first.epsilon[index] / other - 1) * 100);
	});
	return ratio;
}

export function largestDifference(ratio: Ratio): { xiRadPerS: number; percent: number } | null {
	let largest: { xiRadPerS: number; percent: number } | null = null;
	ratio.percent.forEach((percent, index) => {
		if (largest === null || Math.abs(percent) > Math.abs(largest.percent))
			largest = { xiRadPerS: ratio.xiRadPerS[index], percent };
	});
	return largest;
}
