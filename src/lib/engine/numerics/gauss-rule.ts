/**
 * Gauss rules for sums over consecutive integers and, as their limit, for integrals.
 *
 * The discrete measure with unit mass at `length` equidistant points has the monic recurrence (Gram polynomials, on
 * points spread over (-1, 1) with spacing 2/length)
 *
 *     p_{k+1} = x p_k - b_k p_{k-1},   b_k = k^2 (1 - k^2/length^2)/(4 k^2 - 1),
 *
 * which turns into Legendre's for length = Infinity. Nodes are the zeros of p_m by Newton's method from a bracket
 * between the zeros of p_{m-1}; weights are Christoffel numbers 1/sum_k p_k(x)^2 with orthonormal p_k. All weights
 * are positive; the rule is exact for polynomials of degree 2m - 1, and exact at all when length <= m.
 */
export interface GaussRule {
	/** On (-1, 1), ascending. */
	nodes: Float64Array;
	/** Sum to one. */
	weights: Float64Array;
	/** weights[i] * p_{m-1-j}(nodes[i]) with p orthonormal, j = 0, 1, 2: they project a function on its last degrees. */
	projections: Float64Array[];
}

/** Values of the orthonormal polynomials 0..degree at x, for the measure scaled to mass one. */
function orthonormalValues(x: number, degree: number, offDiagonal: Float64Array, out: Float64Array): void {
	out[0] = 1;
	for (let k = 0; k < degree; k++) {
		const below = k > 0 ? offDiagonal[k] * out[k - 1] : 0;
		out[k + 1] = (x * out[k] - below) / offDiagonal[k + 1];
	}
}

/** Zero of p_degree inside (low, high), where it changes sign once: bisection made fast by regula falsi. */
function zeroBetween(low: number, high: number, evaluate: (x: number) => number): number {
	let a = low;
	let b = high;
	let fa = evaluate(a);
	for (let step = 0; step < 200; step++) {
		const x = (a + b) / 2;
		if (x <= a || x >= b) break;
		const fx = evaluate(x);
		if (fx === 0) return x;
		if (fx < 0 === fa < 0) {
			a = x;
			fa = fx;
		} else {
			b = x;
		}
	}
	return (a + b) / 2;
}

/**
 * @param count   number of nodes m, 1..16; for a sum over `length` integers at most `length`
 * @param length  number of integers summed over, or Infinity for an integral
 * @throws RangeError outside these ranges
 */
export function gaussRule(count: number, length: number): GaussRule {
	if (!Number.isInteger(count) || count < 1 || count > 16 || !(length >= count)) {
		throw new RangeError(`gaussRule(${count}, ${length}): need 1 <= count <= 16 and count <= length`);
	}
	const inverseSquare = length === Infinity ? 0 : 1 / (length * length);
	const offDiagonal = new Float64Array(count + 1);
	for (let k = 1; k <= count; k++) {
		offDiagonal[k] = Math.sqrt((k * k * (1 - k * k * inverseSquare)) / (4 * k * k - 1));
	}
	// The recurrence ends at p_length = 0 on all points; any positive scale for the last step gives the same zeros.
	if (!(offDiagonal[count] > 0)) offDiagonal[count] = 1;
	const values = new Float64Array(count + 1);
	let zeros: number[] = [];
	for (let degree = 1; degree <= count; degree++) {
		const edges = [-1, ...zeros, 1];
		const evaluate = (x: number): number => {
			orthonormalValues(x, degree, offDiagonal, values);
			return values[degree];
		};
		zeros = edges.slice(1).map((edge, i) => zeroBetween(edges[i], edge, evaluate));
	}
	const nodes = Float64Array.from(zeros);
	const weights = new Float64Array(count);
	const projections = [0, 1, 2].map(() => new Float64Array(count));
	nodes.forEach((x, i) => {
		orthonormalValues(x, count - 1, offDiagonal, values);
		let sum = 0;
		for (let k = 0; k < count; k++) sum += values[k] * values[k];
		weights[i] = 1 / sum;
		projections.forEach((row, j) => {
			if (count - 1 - j >= 0) row[i] = values[count - 1 - j] / sum;
		});
	});
	return { nodes, weights, projections };
}
