/** Points a unit of x; a power of two, so that x - n/DENSITY is exact. */
const DENSITY = 128;

/** e^-x is given up to here; beyond it nothing is seen (stack.ts, "opaque"). */
export const FADED = 64;

const stays = Float64Array.from({ length: FADED * DENSITY + 1 }, (_, n) => Math.exp(-n / DENSITY));
const goes = Float64Array.from({ length: FADED * DENSITY + 1 }, (_, n) => -Math.expm1(-n / DENSITY));

/**
 * e^-x and 1 - e^-x for x >= 0, written at one place of two arrays. With x = n/128 + r, r >= 0,
 *
 *     1 - e^-r = r (1 - r/2 (1 - r/3 (...))),   e^-x = e^{-n/128} (1 - (1 - e^-r)),   1 - e^-x = (1 - e^{-n/128}) + e^{-n/128} (1 - e^-r)
 *
 * and no step subtracts numbers of like size: each keeps its digits. Thin films need the second, thick ones the first.
 */
export function fading(x: number, kept: Float64Array, lost: Float64Array, at: number): void {
	if (!(x < FADED)) {
		kept[at] = Math.exp(-x);
		lost[at] = 1 - kept[at];
		return;
	}
	const n = (x * DENSITY) | 0;
	const r = x - n / DENSITY;
	const step = r * (1 - (r / 2) * (1 - r * (1 / 3) * (1 - (r / 4) * (1 - r * (1 / 5) * (1 - r * (1 / 6))))));
	const taken = stays[n] * step;
	kept[at] = stays[n] - taken;
	lost[at] = goes[n] + taken;
}
