const ZETA_3 = 1.2020569031595942;
const PI_SQUARED_OVER_6 = Math.PI ** 2 / 6;

/** Coefficients of w^k, k >= 3, in the expansion of Li_3(e^w): zeta(3 - k)/k!, non-zero for odd 3 - k only. */
const NEAR_ONE: readonly [power: number, coefficient: number][] = [
	[3, -1 / 12],
	[4, -1 / 288],
	[6, 1 / 86400],
	[8, -1 / 10160640],
	[10, 1 / 870912000],
	[12, -1 / 63228211200],
	[14, 691 / (32760 * 87178291200)],
	[16, -1 / (12 * 20922789888000)]
];

/**
 * Li_3(x) for -1 <= x <= 1, to a few units of the last place, by the power series for |x| <= 1/2 and above by the
 * expansion in w = ln x, `Li_3(e^w) = zeta(3) + zeta(2) w + w^2 (3/2 - ln(-w))/2 + sum zeta(3-k) w^k/k!`; negative x
 * below -1/2 by duplication, Li_3(x) = Li_3(x^2)/4 - Li_3(-x).
 *
 * @throws RangeError outside [-1, 1]
 */
export function trilogarithm(x: number): number {
	if (!(x >= -1 && x <= 1)) throw new RangeError(`trilogarithm(${x}): defined here for -1 <= x <= 1`);
	if (Math.abs(x) <= 0.5) {
		let sum = 0;
		for (let k = 60; k >= 1; k--) sum = x * (1 / (k * k * k) + sum);
		return sum;
	}
	if (x < 0) return trilogarithm(x * x) / 4 - trilogarithm(-x);
	if (x === 1) return ZETA_3;
	const w = Math.log(x);
	let sum = 0;
	for (let i = NEAR_ONE.length - 1; i >= 0; i--) sum += NEAR_ONE[i][1] * w ** NEAR_ONE[i][0];
	return sum + (w * w * (1.5 - Math.log(-w))) / 2 + PI_SQUARED_OVER_6 * w + ZETA_3;
}
