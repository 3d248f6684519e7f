/**
 * Piecewise cubic Hermite interpolation that keeps monotone data monotone: inner slopes are the weighted harmonic
 * mean of the neighbouring secants (zero where these differ in sign), end slopes the one-sided three-point formula,
 * limited (Fritsch and Carlson 1980; Fritsch and Butland 1984).
 *
 * @param x  ascending, at least two points
 * @param y  as many values
 * @returns the interpolant on [x[0], x[last]]; outside it the end value
 */
export function pchip(x: readonly number[], y: readonly number[]): (at: number) => number {
	const n = x.length;
	const width = Float64Array.from({ length: n - 1 }, (_, i) => x[i + 1] - x[i]);
	const secant = Float64Array.from({ length: n - 1 }, (_, i) => (y[i + 1] - y[i]) / width[i]);
	const slope = new Float64Array(n);
	for (let i = 1; i < n - 1; i++) {
		if (secant[i - 1] * secant[i] <= 0) continue;
		const w1 = 2 * width[i] + width[i - 1];
		const w2 = width[i] + 2 * width[i - 1];
		slope[i] = (w1 + w2) / (w1 / secant[i - 1] + w2 / secant[i]);
	}
	slope[0] = n > 2 ? endSlope(width[0], width[1], secant[0], secant[1]) : secant[0];
	slope[n - 1] = n > 2 ? endSlope(width[n - 2], width[n - 3], secant[n - 2], secant[n - 3]) : secant[0];
	return (at) => {
		if (at <= x[0]) return y[0];
		if (at >= x[n - 1]) return y[n - 1];
		let low = 0;
		let high = n - 1;
		while (high - low > 1) {
			const middle = (low + high) >> 1;
			if (x[middle] <= at) low = middle;
			else high = middle;
		}
		const h = width[low];
		const t = (at - x[low]) / h;
		const c2 = 3 * secant[low] - 2 * slope[low] - slope[high];
		const c3 = slope[low] + slope[high] - 2 * secant[low];
		return y[low] + h * t * (slope[low] + t * (c2 + t * c3));
	};
}

/** Three-point slope at an end, kept from overshooting. */
function endSlope(h0: number, h1: number, s0: number, s1: number): number {
	const slope = ((2 * h0 + h1) * s0 - h0 * s1) / (h0 + h1);
	if (slope * s0 <= 0) return 0;
	if (s0 * s1 <= 0 && Math.abs(slope) > 3 * Math.abs(s0)) return 3 * s0;
	return slope;
}
