/**
 * Rules of the slow evaluator. All rest on one fact: passive bodies have no mode at Re(xi) > 0, nor at real xi > 0 and
 * k^2 >= 0, so the integrands are analytic in the right half plane of xi and in the right half plane of u = q - q_min.
 * Hence in ln xi and ln u they are analytic in a strip of half width pi/2, whatever the materials, and rules on
 * logarithmic panels converge at a rate known beforehand.
 */

export interface Rule {
	readonly nodes: readonly number[];
	readonly weights: readonly number[];
}

/** Gauss-Legendre on [-1, 1] by Newton's method on the three-term recurrence. */
export function gaussLegendre(count: number): Rule {
	const nodes: number[] = [];
	const weights: number[] = [];
	for (let i = 0; i < count; i++) {
		let x = -Math.cos((Math.PI * (i + 0.75)) / (count + 0.5));
		let slope = 1;
		for (let round = 0; round < 60; round++) {
			let current = 1;
			let previous = 0;
			for (let j = 1; j <= count; j++)
				[current, previous] = [((2 * j - 1) * x * current - (j - 1) * previous) / j, current];
			slope = (count * (x * current - previous)) / (x * x - 1);
			const step = current / slope;
			x -= step;
			if (Math.abs(step) < 1e-17) break;
		}
		nodes.push(x);
		weights.push(2 / ((1 - x * x) * slope * slope));
	}
	return { nodes, weights };
}

/** Nodes and weights of int_from^to, linear or in the logarithm of the variable. */
export function onPanel(rule: Rule, from: number, to: number, logarithmic: boolean): Rule {
	if (logarithmic) {
		const half = Math.log(to / from) / 2;
		const middle = Math.sqrt(from * to);
		const nodes = rule.nodes.map((x) => middle * Math.exp(half * x));
		return { nodes, weights: rule.weights.map((w, i) => w * half * nodes[i]) };
	}
	const half = (to - from) / 2;
	return { nodes: rule.nodes.map((x) => from + half * (1 + x)), weights: rule.weights.map((w) => w * half) };
}

/** Where panels in u, unit 1/(2d), end once the exponential rules; 14 nodes each lose nothing at 1e-16. */
const EXPONENTIAL_PANELS = [1, 3, 7, 14, 26, 50];

/** Ratio of ends of a logarithmic panel: 14 nodes then converge to 3.8^-28. */
const PANEL_RATIO = 6;

/**
 * A rule for int_0^inf du of integrands that fall like e^-(fall u) and whose singularities keep at least `scale` from
 * u = 0.
 */
export function exponentialRule(rule: Rule, scale: number, fall = 1): Rule {
	const nodes: number[] = [];
	const weights: number[] = [];
	const append = (panel: Rule) => {
		nodes.push(...panel.nodes);
		weights.push(...panel.weights);
	};
	const first = Math.min(scale * fall, 1);
	append(onPanel(rule, 0, first, false));
	const count = Math.ceil(Math.log(1 / first) / Math.log(PANEL_RATIO) - 1e-9);
	for (let i = 0; i < count; i++)
		append(onPanel(rule, first ** (1 - i / count), first ** (1 - (i + 1) / count), true));
	for (let i = 1; i < EXPONENTIAL_PANELS.length; i++)
		append(onPanel(rule, EXPONENTIAL_PANELS[i - 1], EXPONENTIAL_PANELS[i], false));
	return { nodes: nodes.map((u) => u / fall), weights: weights.map((w) => w / fall) };
}

/** Nodes of the Chebyshev interpolant a block of integers is summed by. */
const CHEBYSHEV_COUNT = 22;

/** Fewer integers than this are cheaper one by one. */
const SHORTEST_BLOCK = 40;

/** B_2k/(2k)! of the Euler-Maclaurin formula. */
const EULER_MACLAURIN = [
	1 / 12,
	-1 / 720,
	1 / 30240,
	-1 / 1209600,
	1 / 47900160,
	-691 / 1307674368000,
	1 / 74724249600
];

/** What a sum of rows has come to: totals, a bound on what the interpolation lost, and the terms computed. */
export interface BlockSum {
	total: Float64Array;
	lost: Float64Array;
	evaluations: number;
}

/**
 * sum_{n=from}^{to} f(n) for a vector-valued f, by the Chebyshev interpolant of f on [from, to] and the Euler-Maclaurin
 * formula, which for a polynomial has no remainder. For f analytic in Re n > 0 and to <= 2 from, 22 nodes lose 5.8^-22;
 * the last two coefficients are the measure of what is lost in fact.
 */
export function sumOfBlock(
	f: (n: number) => Float64Array,
	from: number,
	to: number,
	width: number
): BlockSum {
	const total = new Float64Array(width);
	const lost = new Float64Array(width);
	if (to - from + 1 < SHORTEST_BLOCK) {
		for (let n = from; n <= to; n++) {
			const row = f(n);
			for (let c = 0; c < width; c++) total[c] += row[c];
		}
		return { total, lost, evaluations: Math.max(0, to - from + 1) };
	}
	const count = CHEBYSHEV_COUNT;
	const half = (to - from) / 2;
	const rows: Float64Array[] = [];
	for (let j = 0; j < count; j++)
		rows.push(f(from + half * (1 + Math.cos((Math.PI * (j + 0.5)) / count))).slice());
	for (let c = 0; c < width; c++) {
		const coefficients: number[] = [];
		for (let k = 0; k < count; k++) {
			let sum = 0;
			for (let j = 0; j < count; j++) sum += rows[j][c] * Math.cos((Math.PI * k * (j + 0.5)) / count);
			coefficients.push(((k === 0 ? 1 : 2) * sum) / count);
		}
		let result = 0;
		for (let k = 0; k < count; k++) {
			const even = k % 2 === 0;
			// int_-1^1 T_k = 2/(1 - k^2), and the two ends with weight one half
			let part = even ? (2 * half) / (1 - k * k) + 1 : 0;
			let derivative = 1;
			for (let m = 1; m <= 2 * EULER_MACLAURIN.length - 1; m++) {
				derivative *= (k * k - (m - 1) * (m - 1)) / ((2 * m - 1) * half);
				// odd derivatives of T_k at 1 less those at -1: twice for even k, nothing for odd k
				if (m % 2 === 1 && even) part += EULER_MACLAURIN[(m - 1) / 2] * 2 * derivative;
			}
			result += coefficients[k] * part;
		}
		total[c] = result;
		lost[c] = (Math.abs(coefficients[count - 1]) + Math.abs(coefficients[count - 2])) * (to - from + 1);
	}
	return { total, lost, evaluations: count };
}
