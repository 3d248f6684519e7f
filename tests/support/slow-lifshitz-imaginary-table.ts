/**
 * A table of eps(i xi) between its points: the monotone cubic of Fritsch & Butland (SIAM J. Sci. Stat. Comput. 5, 300,
 * 1984) through ln(eps - 1) over ln xi, or through eps - 1 where a point has eps = 1. Constant below the first point;
 * above the last one eps - 1 falls like xi^-2.
 */
export function imaginaryTableSusceptibility(
	frequencies: readonly number[],
	epsilon: readonly number[],
	xi: number
): number {
	const last = frequencies.length - 1;
	if (xi <= frequencies[0]) return epsilon[0] - 1;
	if (xi >= frequencies[last]) return (epsilon[last] - 1) * (frequencies[last] / xi) ** 2;
	const logarithmic = epsilon.every((eps) => eps > 1);
	const ordinate = epsilon.map((eps) => (logarithmic ? Math.log(eps - 1) : eps - 1));
	let i = 0;
	while (xi >= frequencies[i + 1]) i++;
	const width = (j: number) => Math.log(frequencies[j + 1] / frequencies[j]);
	const secant = (j: number) => (ordinate[j + 1] - ordinate[j]) / width(j);
	const h = width(i);
	const t = Math.log(xi / frequencies[i]) / h;
	const s = 1 - t;
	const value =
		ordinate[i] * s * s * (1 + 2 * t) +
		ordinate[i + 1] * t * t * (1 + 2 * s) +
		h * slopeAt(i, last, width, secant) * t * s * s -
		h * slopeAt(i + 1, last, width, secant) * t * t * s;
	return logarithmic ? Math.exp(value) : value;
}

type ByInterval = (j: number) => number;

function slopeAt(j: number, last: number, width: ByInterval, secant: ByInterval): number {
	if (last === 1) return secant(0);
	if (j === 0) return endSlope(width(0), width(1), secant(0), secant(1));
	if (j === last) return endSlope(width(last - 1), width(last - 2), secant(last - 1), secant(last - 2));
	const [before, after] = [secant(j - 1), secant(j)];
	if (before * after <= 0) return 0;
	const [left, right] = [2 * width(j) + width(j - 1), width(j) + 2 * width(j - 1)];
	return (left + right) / (left / before + right / after);
}

/** Three-point slope at an end, kept from overshooting. */
function endSlope(near: number, next: number, secantNear: number, secantNext: number): number {
	const slope = ((2 * near + next) * secantNear - near * secantNext) / (near + next);
	if (slope * secantNear <= 0) return 0;
	if (secantNear * secantNext <= 0 && Math.abs(slope) > 3 * Math.abs(secantNear)) return 3 * secantNear;
	return slope;
}
