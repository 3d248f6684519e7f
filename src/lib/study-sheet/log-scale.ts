/** One logarithmic axis, shared by every strip of a stack so that the hairline crosses all of them at one value. */

export interface LogScale {
	readonly min: number;
	readonly max: number;
	/** Pixel of a value. */
	at(value: number): number;
	/** Value under a pixel, held inside the axis. */
	invert(pixel: number): number;
	/** Powers of ten inside the axis. */
	readonly decades: readonly number[];
	/** 2 to 9 between the decades. */
	readonly minors: readonly number[];
}

export function logScale(domain: readonly [number, number], range: readonly [number, number]): LogScale {
	const [min, max] = domain;
	const [left, right] = range;
	const start = Math.log10(min);
	const perDecade = (right - left) / (Math.log10(max) - start);

	const decades: number[] = [];
	const minors: number[] = [];
	for (let power = Math.floor(start); power <= Math.ceil(Math.log10(max)); power++) {
		for (let step = 1; step < 10; step++) {
			const value = Number(`${step}e${power}`);
			if (value < min || value > max) continue;
			(step === 1 ? decades : minors).push(value);
		}
	}

	return {
		min,
		max,
		decades,
		minors,
		at: (value) => left + (Math.log10(value) - start) * perDecade,
		invert: (pixel) => Math.min(max, Math.max(min, 10 ** (start + (pixel - left) / perDecade)))
	};
}
