import { intervalBlock, matsubaraBlock, type FrequencyBlock } from '../lifshitz/frequency-blocks.ts';
import { matsubaraFrequency } from '../lifshitz/matsubara.ts';
import { roundTripTime, type System } from '../system.ts';

/** One frequency with its weight in two rules, of which one is finer: their difference is the error of the coarser. */
export interface RuleNode {
	xi: number;
	fine: number;
	coarse: number;
}

const DIRECT = 16;
const FINE = 10;
const COARSE = 7;

/** y0 of a vacuum gap beyond which e^-y0 is nothing against the sum. */
const LAST_PHASE = 60;
/** Where permittivities have died even at the smallest gaps, rad/s. */
const HIGHEST = 2e20;

/** At T = 0: octaves below c/2d, and a last piece down to zero. */
const OCTAVES_BELOW = 26;

/**
 * Frequencies that stand for all terms n >= 1, or at T = 0 for the integral over xi: methods.md section 9, "Blocks". Apart from
 * the rules of the sums themselves so that those may be tuned alone.
 *
 * @param separation  m
 */
export function frequencyRule({ temperature, knots }: System, separation: number): RuleNode[] {
	const highest = Math.min(HIGHEST, LAST_PHASE / roundTripTime(separation));
	const nodes: RuleNode[] = [];
	const add = (block: FrequencyBlock, rule: 'fine' | 'coarse'): void =>
		block.xi.forEach((xi, i) =>
			nodes.push({
				xi,
				fine: rule === 'fine' || block.exact ? block.weight[i] : 0,
				coarse: rule === 'coarse' || block.exact ? block.weight[i] : 0
			})
		);
	const addBoth = (make: (count: number) => FrequencyBlock): void => {
		const fine = make(FINE);
		add(fine, 'fine');
		if (!fine.exact) add(make(COARSE), 'coarse');
	};
	if (temperature > 0) {
		const first = matsubaraFrequency(1, temperature);
		for (let n = 1; n < DIRECT; n++) addBoth((count) => matsubaraBlock(n, n + 1, count, temperature));
		for (let from = DIRECT; from * first < highest; from *= 2) {
			const inside = knots.map((xi) => Math.ceil(xi / first)).filter((n) => n > from && n < 2 * from);
			const edges = [from, ...new Set(inside), 2 * from];
			edges.slice(1).forEach((to, i) => addBoth((count) => matsubaraBlock(edges[i], to, count, temperature)));
		}
		return nodes;
	}
	const lowest = 2 ** Math.floor(Math.log2(1 / roundTripTime(separation)) - OCTAVES_BELOW);
	const addInterval = (from: number, to: number): void => {
		const edges = [from, ...knots.filter((xi) => xi > from && xi < to), to];
		edges.slice(1).forEach((end, i) => addBoth((count) => intervalBlock(edges[i], end, count)));
	};
	addInterval(0, lowest);
	for (let from = lowest; from < highest; from *= 2) addInterval(from, 2 * from);
	return nodes;
}

/** Sum of a function over a rule with what the coarser rule differs by, in whatever unit the function has. */
export function summed(
	nodes: readonly RuleNode[],
	of: (index: number) => number
): { value: number; error: number } {
	let fine = 0;
	let coarse = 0;
	nodes.forEach((node, index) => {
		const value = of(index);
		fine += node.fine * value;
		coarse += node.coarse * value;
	});
	return { value: fine, error: Math.abs(fine - coarse) };
}
