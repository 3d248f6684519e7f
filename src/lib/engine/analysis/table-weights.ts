import type { RuleNode } from './frequency-rule.ts';
import { gaussRule } from '../numerics/gauss-rule.ts';
import type { TableModel } from '../permittivity/table.ts';
import { segmentAt, segmentsOf } from '../permittivity/segments.ts';
import { radPerSFromEv } from '../units.ts';

/** Nodes of one piece of a segment in ln omega, pieces no longer than this. */
const NODES = 6;
const LONGEST = Math.LN2;

/**
 * eps - 1 by what each point of a table gives to it: with hats h_i(ln omega), one at point i and zero at its neighbours,
 *
 *     chi_i(i xi) = (2/pi) int omega eps'' h_i/(omega^2 + xi^2) d omega,   sum_i chi_i = the part inside the table
 *
 * turned round at once into what result each point carries: sum over xi of derivative times chi_i. The ends continue the
 * outermost points and go with them.
 *
 * @param shares       eps - 1 below and above the table at each node, and at xi = 0
 * @param derivative   to eps(i xi) of each node, weights of the rule included
 * @param still        the same for eps(0)
 * @returns one value a point of the table: change of the result where eps'' there grows by its own size
 */
export function resultByPoint(
	model: TableModel,
	nodes: readonly RuleNode[],
	shares: { below: readonly number[]; above: readonly number[]; atZero: { below: number; above: number } },
	derivative: readonly number[],
	still: number
): number[] {
	const omegas = model.energiesEv.map(radPerSFromEv);
	const result = new Array<number>(omegas.length).fill(0);
	const rule = gaussRule(NODES, Infinity);
	const squares = nodes.map(({ xi }) => xi * xi);
	const carried = (omega: number): number => {
		const square = omega * omega;
		let sum = still / square;
		for (let k = 0; k < squares.length; k++) sum += derivative[k] / (square + squares[k]);
		return sum;
	};
	for (const segment of segmentsOf(omegas, model.epsilon2)) {
		const i = omegas.indexOf(segment.from);
		const length = Math.log(segment.to / segment.from);
		const pieces = Math.max(1, Math.ceil(length / LONGEST));
		for (let p = 0; p < pieces; p++) {
			rule.nodes.forEach((x, j) => {
				const part = (p + (1 + x) / 2) / pieces;
				const omega = segment.from * Math.exp(length * part);
				const weight = (2 / Math.PI) * (length / pieces) * rule.weights[j];
				const value = weight * omega * omega * segmentAt(segment, omega) * carried(omega);
				result[i] += (1 - part) * value;
				result[i + 1] += part * value;
			});
		}
	}
	const end = (of: readonly number[], atZero: number): number =>
		of.reduce((sum, chi, k) => sum + chi * derivative[k], still * atZero);
	result[0] += end(shares.below, shares.atZero.below);
	result[result.length - 1] += end(shares.above, shares.atZero.above);
	return result;
}

/** Relative uncertainties given at some energies, at the energies of the table: straight in ln(energy), constant beyond. */
export function interpolated(
	energiesEv: readonly number[],
	relative: readonly number[],
	at: readonly number[]
): number[] {
	return at.map((energy) => {
		const above = energiesEv.findIndex((one) => one >= energy);
		if (above < 0) return relative[relative.length - 1];
		if (above === 0) return relative[0];
		const [low, high] = [energiesEv[above - 1], energiesEv[above]];
		const part = Math.log(energy / low) / Math.log(high / low);
		return relative[above - 1] + part * (relative[above] - relative[above - 1]);
	});
}
