import { gaussRule } from './gauss-rule.ts';

/** Where the normal distribution is cut, in standard deviations; what lies beyond is 2e-9 of it. */
export const CUT = 6;

/** Panels and nodes of the rule that stands for the weight itself: exact to rounding for the degrees needed. */
const PANELS = 12;
const PANEL_NODES = 16;

export interface CutGaussianRule {
	/** In standard deviations, ascending, symmetric about zero. */
	nodes: Float64Array;
	/** Sum to one. */
	weights: Float64Array;
}

const rules = new Map<number, CutGaussianRule>();

/**
 * Gauss rule of the normal distribution cut at +-6 standard deviations and renormalised, exact for polynomials of degree
 * 2m - 1: discretised Stieltjes procedure for the recurrence, bisection between interlacing zeros, Christoffel numbers as
 * weights. Rules are kept.
 *
 * @param count  number of nodes m, 1..40
 * @throws RangeError outside this range
 */
export function cutGaussianRule(count: number): CutGaussianRule {
	if (!Number.isInteger(count) || count < 1 || count > 40)
		throw new RangeError(`cutGaussianRule(${count}): need 1 <= count <= 40`);
	const known = rules.get(count) ?? made(count);
	rules.set(count, known);
	return known;
}

function made(count: number): CutGaussianRule {
	const offDiagonal = recurrence(count);
	const values = new Float64Array(count + 1);
	const evaluate = (x: number, degree: number): number => {
		values[0] = 1;
		for (let k = 0; k < degree; k++)
			values[k + 1] = (x * values[k] - (k > 0 ? offDiagonal[k] * values[k - 1] : 0)) / offDiagonal[k + 1];
		return values[degree];
	};
	let zeros: number[] = [];
	for (let degree = 1; degree <= count; degree++) {
		const edges = [-CUT, ...zeros, CUT];
		zeros = edges.slice(1).map((edge, i) => zeroBetween(edges[i], edge, (x) => evaluate(x, degree)));
	}
	const weights = zeros.map((x) => {
		evaluate(x, count - 1);
		let sum = 0;
		for (let k = 0; k < count; k++) sum += values[k] ** 2;
		return 1 / sum;
	});
	return { nodes: Float64Array.from(zeros), weights: Float64Array.from(weights) };
}

/** b_k of x p_k = b_{k+1} p_{k+1} + b_k p_{k-1} for the orthonormal polynomials of an even weight. */
function recurrence(count: number): Float64Array {
	const panel = gaussRule(PANEL_NODES, Infinity);
	const half = CUT / PANELS;
	const x: number[] = [];
	const mass: number[] = [];
	for (let p = 0; p < PANELS; p++) {
		panel.nodes.forEach((node, i) => {
			const place = -CUT + half * (2 * p + 1 + node);
			x.push(place);
			mass.push(panel.weights[i] * Math.exp(-(place ** 2) / 2));
		});
	}
	const total = mass.reduce((sum, one) => sum + one, 0);
	const b = new Float64Array(count + 1);
	let before = x.map(() => 0);
	let now = x.map(() => 1);
	for (let k = 1; k <= count; k++) {
		const next = x.map((place, i) => place * now[i] - b[k - 1] * before[i]);
		const norm = next.reduce((sum, value, i) => sum + mass[i] * value ** 2, 0) / total;
		b[k] = Math.sqrt(norm);
		before = now;
		now = next.map((value) => value / b[k]);
	}
	return b;
}

function zeroBetween(low: number, high: number, evaluate: (x: number) => number): number {
	let [a, b] = [low, high];
	const below = evaluate(a) < 0;
	for (let step = 0; step < 200; step++) {
		const x = (a + b) / 2;
		if (x <= a || x >= b) break;
		if (evaluate(x) < 0 === below) a = x;
		else b = x;
	}
	return (a + b) / 2;
}
