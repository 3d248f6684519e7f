import { gaussRule, type GaussRule } from '../numerics/gauss-rule.ts';
import { matsubaraFrequency } from './matsubara.ts';
import type { Level } from './level.ts';

/**
 * A stretch of frequencies with a Gauss rule over it: consecutive Matsubara terms [from, to), or at T = 0 an interval
 * of xi. Frequencies depend on temperature alone, so eps(i xi) is computed once a material and serves every separation
 * (methods.md section 9, "Blocks").
 */
export interface FrequencyBlock {
	xi: Float64Array;
	/** Sum to the number of terms, or to the length of the interval. */
	weight: Float64Array;
	/** Coefficients of the last three orthonormal polynomials, times the root of the total weight. */
	projections: Float64Array[];
	/** Distance of the outer nodes on (-1, 1). */
	reach: number;
	/** All terms are there: no error of summation. */
	exact: boolean;
	/** Last block of its octave: the tail is judged here. */
	closesOctave: boolean;
	/** Node i is computed on the lattice shifted by half a step where parity + i is odd. */
	parity: number;
	/** Computed on both lattices: terms that may carry the whole result alone. */
	doubled: boolean;
	/** eps(i xi) - 1 and mu(i xi) by material, filled when first asked for. */
	chi: Float64Array[];
	mu: Float64Array[];
}

/** Matsubara terms up to this one are computed on two lattices. */
const DOUBLED = 2;

const rules = new Map<string, GaussRule>();

function ruleFor(count: number, length: number): GaussRule {
	const key = `${count}/${length}`;
	const known = rules.get(key) ?? gaussRule(count, length);
	rules.set(key, known);
	return known;
}

function block(
	rule: GaussRule,
	total: number,
	place: (x: number) => number,
	exact: boolean,
	parity = 0
): FrequencyBlock {
	return {
		xi: rule.nodes.map(place),
		weight: rule.weights.map((w) => w * total),
		projections: rule.projections.map((row) => row.map((value) => value * total)),
		reach: rule.nodes[rule.nodes.length - 1] - rule.nodes[0],
		exact,
		closesOctave: true,
		parity,
		doubled: false,
		chi: [],
		mu: []
	};
}

/** Terms from..to-1 of the Matsubara sum. */
export function matsubaraBlock(from: number, to: number, nodes: number, temperature: number): FrequencyBlock {
	const length = to - from;
	const count = Math.min(nodes, length);
	const rule = ruleFor(count, length);
	const place = (x: number): number => {
		const n = from + (length - 1) / 2 + (x * length) / 2;
		// Where every term has its node, the node is the integer itself.
		return matsubaraFrequency(count === length ? Math.round(n) : n, temperature);
	};
	return block(rule, length, place, count === length, from & 1);
}

/** The interval from..to of xi, rad/s. */
export function intervalBlock(from: number, to: number, nodes: number): FrequencyBlock {
	const half = (to - from) / 2;
	return block(ruleFor(nodes, Infinity), to - from, (x) => from + half * (1 + x), false);
}

/** Blocks of one octave [from, 2 from) of Matsubara terms, cut where a permittivity has a knot. */
function octaveBlocks(
	from: number,
	level: Level,
	temperature: number,
	knots: readonly number[]
): FrequencyBlock[] {
	const first = matsubaraFrequency(1, temperature);
	const edges = knots.map((xi) => Math.ceil(xi / first)).filter((n) => n > from && n < 2 * from);
	const bounds = [from, ...new Set(edges), 2 * from];
	const blocks = bounds.slice(1).map((to, i) => matsubaraBlock(bounds[i], to, level.nodes, temperature));
	blocks.forEach((one, i) => (one.closesOctave = i === blocks.length - 1));
	return blocks;
}

/**
 * Matsubara terms from n = 1 upwards, block by block, made when first asked for and kept.
 *
 * @param temperature  K, > 0
 * @param knots        rad/s, ascending, where some permittivity is not analytic
 */
export function matsubaraBlocks(
	level: Level,
	temperature: number,
	knots: readonly number[]
): (index: number) => FrequencyBlock {
	const blocks: FrequencyBlock[] = [];
	for (let n = 1; n < level.direct; n++) {
		const one = matsubaraBlock(n, n + 1, 1, temperature);
		one.closesOctave = (n & (n + 1)) === 0;
		one.doubled = n <= DOUBLED;
		blocks.push(one);
	}
	let next = level.direct;
	return (index) => {
		while (blocks.length <= index) {
			blocks.push(...octaveBlocks(next, level, temperature, knots));
			next *= 2;
		}
		return blocks[index];
	};
}

/** One frequency that stands for a stretch of the axis: to see how large terms are there, not to be summed. */
export function probeBlock(xi: number, weight: number): FrequencyBlock {
	return block(ruleFor(1, 1), weight, () => xi, true);
}

/** At T = 0: blocks of the octave [2^k, 2^(k+1)) rad/s, and the block [0, 2^k) below it. */
export interface ZeroTemperatureBlocks {
	octave(k: number): FrequencyBlock[];
	below(k: number): FrequencyBlock[];
}

/** Intervals of xi for T = 0, cut at the knots, made when first asked for and kept. */
export function zeroTemperatureBlocks(level: Level, knots: readonly number[]): ZeroTemperatureBlocks {
	const octaves = new Map<number, FrequencyBlock[]>();
	const starts = new Map<number, FrequencyBlock[]>();
	const cut = (from: number, to: number): FrequencyBlock[] => {
		const bounds = [from, ...knots.filter((xi) => xi > from && xi < to), to];
		return bounds.slice(1).map((end, i) => intervalBlock(bounds[i], end, level.nodes));
	};
	const kept = (
		store: Map<number, FrequencyBlock[]>,
		k: number,
		from: number,
		to: number
	): FrequencyBlock[] => {
		const known = store.get(k) ?? cut(from, to);
		store.set(k, known);
		return known;
	};
	return {
		octave: (k) => kept(octaves, k, 2 ** k, 2 ** (k + 1)),
		below: (k) => kept(starts, k, 0, 2 ** k)
	};
}
