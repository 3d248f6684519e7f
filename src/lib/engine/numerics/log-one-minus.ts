/** Centres c = j/128 of the table, from 1/4 to 2. */
const DENSITY = 128;
const HIGHEST = 2;
const logarithms = Float64Array.from({ length: HIGHEST * DENSITY + 1 }, (_, j) => Math.log(j / DENSITY));

/** The square of 1/128: below, eight terms of the series of ln(1 - z) itself do, and need no division. */
const SMALL = 2 ** -14;

/** Beyond this the centres lie too far apart for the series. */
const LARGEST = 0.75;

/**
 * ln(1 - z) for -1 <= z < 1, to four units of the last place of its own value, however small z is. With m = 1 - z and
 * the centre c next to it,
 *
 *     ln m = ln c + 2 artanh(s),   s = (m - c)/(m + c),   |s| <= 1/128,
 *
 * where m - c = (1 - c) - z is taken before m is rounded: nothing is lost beside m = 1. A call of the runtime's own
 * logarithm costs several times as much, and half of the time of a metal's integrals went there.
 */
export function logOneMinus(z: number): number {
	const square = z * z;
	if (square < SMALL) {
		const late = 1 / 5 + z * (1 / 6) + square * (1 / 7 + z * (1 / 8));
		return -z * (1 + z * 0.5 + square * (1 / 3 + z * 0.25 + square * late));
	}
	if (!(z <= LARGEST && z >= -1)) return Math.log1p(-z);
	const j = ((1 - z) * DENSITY + 0.5) | 0;
	const c = j / DENSITY;
	const rest = 1 - c - z;
	const s = rest / (2 * c + rest);
	const t = s * s;
	return logarithms[j] + 2 * s * (1 + t * (1 / 3 + t * (1 / 5 + t * (1 / 7 + t * (1 / 9)))));
}
