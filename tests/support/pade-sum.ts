/**
 * Poles and weights of the Pade form of the sum over Matsubara frequencies: sum_n f(2 pi n) over n >= 1 becomes
 * sum_j weight_j f(pole_j), frequencies in kT/hbar (Hu, Xu and Yan 2010). Poles are 2/lambda for the positive eigenvalues of
 * the symmetric tridiagonal matrix of order 2N with zeros on its diagonal and 1/sqrt((2m + 1)(2m + 3)) beside it; the
 * matrix that begins one step later gives the zeros between them. Weights are taken factor by factor, one zero to one pole.
 */
export function padeSum(count: number): { poles: number[]; weights: number[] } {
	const poles = reciprocals(count, 3, 2 * count - 1);
	const zeros = reciprocals(count - 1, 5, 2 * count - 2);
	const weights = poles.map((x, j) => {
		const others = poles.filter((_, k) => k !== j);
		return others.reduce(
			(product, pole, k) => (product * (zeros[k] ** 2 - x * x)) / (pole ** 2 - x * x),
			count * count + 1.5 * count
		);
	});
	return { poles, weights };
}

/** 2/lambda of the largest eigenvalues, ascending: the matrix has 1/sqrt(b (b + 2)), b = first, first + 2, ... */
function reciprocals(count: number, first: number, length: number): number[] {
	const beside = Array.from({ length }, (_, i) => 1 / Math.sqrt((first + 2 * i) * (first + 2 + 2 * i)));
	return Array.from({ length: count }, (_, i) => 2 / eigenvalue(beside, i + 1));
}

/** The eigenvalue of a rank from above, by bisection. */
function eigenvalue(beside: readonly number[], rank: number): number {
	let [low, high] = [0, 1];
	for (;;) {
		const middle = (low + high) / 2;
		if (middle <= low || middle >= high) return middle;
		if (above(beside, middle) >= rank) low = middle;
		else high = middle;
	}
}

/** How many eigenvalues lie above x, by the signs of the pivots. */
function above(beside: readonly number[], x: number): number {
	let pivot = -x;
	let count = pivot > 0 ? 1 : 0;
	for (const b of beside) {
		pivot = -x - (b * b) / (pivot === 0 ? Number.MIN_VALUE : pivot);
		if (pivot > 0) count++;
	}
	return count;
}
