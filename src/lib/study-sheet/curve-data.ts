import type { LogScale } from './log-scale.ts';
import type { Band } from './bands.ts';
import type { Series } from './series.ts';

/** From results to paths: pure, in pixels of the strip. */

export interface MagnitudePaths {
	/** Drawn solid. */
	attracts: string;
	/** Drawn hollow. */
	repels: string;
	/** Points whose accuracy was not reached, over either. */
	unmet: string;
}

export interface MagnitudeAxis {
	/** Powers of ten of the lower and upper end. */
	low: number;
	high: number;
	/** Pixel of a magnitude. */
	at(magnitude: number): number;
	/** Powers of ten that carry a label. */
	labels: number[];
	/** Powers of ten with a rule only. */
	ticks: number[];
}

const MIN_DECADES = 2;
const MAX_DECADES = 30;
const fixed = (value: number) => value.toFixed(1);

/** Magnitudes that count for the axis: not those beside a change of sign, which come arbitrarily close to zero. */
function telling({ values }: Pick<Series, 'values'>): number[] {
	const kept = values.filter(
		(value, index) => !(value * values[index - 1] < 0) && !(value * values[index + 1] < 0) && value !== 0
	);
	return (kept.length > 0 ? kept : values).map(Math.abs).filter((value) => value > 0);
}

/** Whole decades that hold the curves. */
export function magnitudeAxis(
	all: readonly Pick<Series, 'values'>[],
	top: number,
	height: number
): MagnitudeAxis {
	const magnitudes = all.flatMap(telling);
	const largest = magnitudes.reduce((a, b) => Math.max(a, b), 0) || 1;
	const smallest = magnitudes.reduce((a, b) => Math.min(a, b), largest);
	// Adding 0 turns a minus zero of the rounding into a plain one: it would be read out as "minus 0".
	const high = Math.ceil(Math.log10(largest) - 1e-9) + 0;
	const low = Math.max(
		high - MAX_DECADES,
		Math.min(high - MIN_DECADES, Math.floor(Math.log10(smallest) + 1e-9))
	);
	const step = Math.max(1, Math.ceil(((high - low) * 24) / height));
	const ticks = Array.from({ length: high - low + 1 }, (_, index) => low + index);
	return {
		low,
		high,
		at: (magnitude) => top + ((high - Math.max(low, Math.log10(magnitude))) / (high - low)) * height,
		labels: ticks.filter((power) => (high - power) % step === 0),
		ticks
	};
}

/** Lines of one series, broken where the sign changes: a line through zero has no place on a logarithmic axis. */
export function magnitudePaths(series: Series, x: LogScale, y: MagnitudeAxis): MagnitudePaths {
	const paths: MagnitudePaths = { attracts: '', repels: '', unmet: '' };
	let before = 0;
	let metBefore = true;
	for (let index = 0; index < series.values.length; index++) {
		const value = series.values[index];
		const sign = Math.sign(value);
		if (sign !== 0) {
			const point = `${fixed(x.at(series.separationsNm[index]))} ${fixed(y.at(Math.abs(value)))}`;
			const command = sign === before ? 'L' : 'M';
			if (sign < 0) paths.attracts += command + point;
			else paths.repels += command + point;
			if (!series.met[index]) paths.unmet += (metBefore || command === 'M' ? 'M' : 'L') + point;
		}
		metBefore = series.met[index];
		before = sign;
	}
	return paths;
}

/** The area between the edges of a band; edges beyond the axis run along it. */
export function bandPath({ separationsNm, low, high }: Band, x: LogScale, y: MagnitudeAxis): string {
	const [top, bottom] = [y.at(10 ** y.high), y.at(10 ** y.low)];
	const place = (nm: number, magnitude: number): string => {
		const at = magnitude > 0 ? Math.max(top, y.at(magnitude)) : bottom;
		return `${fixed(x.at(nm))} ${fixed(at)}`;
	};
	const upper = separationsNm.map((nm, index) => place(nm, high[index]));
	const lower = separationsNm.map((nm, index) => place(nm, low[index])).reverse();
	return `M${[...upper, ...lower].join('L')}Z`;
}

/** A plain line; values outside the limits are held at them, undefined ones break it. */
export function linePath(
	separationsNm: readonly number[],
	values: readonly (number | undefined)[],
	x: LogScale,
	y: (value: number) => number,
	limits: readonly [number, number]
): string {
	let path = '';
	let open = false;
	values.forEach((value, index) => {
		if (value === undefined || !Number.isFinite(value)) {
			open = false;
			return;
		}
		const held = Math.min(limits[1], Math.max(limits[0], value));
		path += `${open ? 'L' : 'M'}${fixed(x.at(separationsNm[index]))} ${fixed(y(held))}`;
		open = true;
	});
	return path;
}

/** Labels at the ends of lines, moved apart so that none covers another; the order of the wanted places is kept. */
export function spreadLabels(
	wanted: readonly number[],
	spacing: number,
	top: number,
	bottom: number
): number[] {
	const order = wanted.map((_, index) => index).sort((a, b) => wanted[a] - wanted[b]);
	const placed = order.map((index) => wanted[index]);
	for (let index = 1; index < placed.length; index++) {
		placed[index] = Math.max(placed[index], placed[index - 1] + spacing);
	}
	let limit = bottom;
	for (let index = placed.length - 1; index >= 0; index--) {
		placed[index] = Math.min(placed[index], limit);
		limit = placed[index] - spacing;
	}
	const result: number[] = new Array(wanted.length);
	order.forEach((index, rank) => (result[index] = Math.max(top + rank * spacing, placed[rank])));
	return result;
}
