import type { ScreeningPlan } from '../schemas/screening.ts';

/** The order of the cells of a screening: rule, temperature, medium, pair. A cell is one arrangement at every separation. */

export interface Cell {
	rule: number;
	temperature: number;
	medium: number;
	left: number;
	right: number;
}

/** Pairs of bodies; unordered where both sides are one list. */
export function pairsIn({ left, right, symmetric }: ScreeningPlan): number {
	return symmetric ? (left.length * (left.length + 1)) / 2 : left.length * right.length;
}

export function cellsIn(plan: ScreeningPlan): number {
	return plan.rules.length * plan.temperaturesK.length * plan.media.length * pairsIn(plan);
}

export const evaluationsIn = (plan: ScreeningPlan): number => cellsIn(plan) * plan.separationsNm.length;

/** Of an unordered pair, the row of the triangle that its number lies in. */
function rowOf(pair: number): number {
	const row = Math.floor((Math.sqrt(8 * pair + 1) - 1) / 2);
	// The root of a large number may round to the next row.
	return (row * (row + 1)) / 2 > pair ? row - 1 : ((row + 1) * (row + 2)) / 2 <= pair ? row + 1 : row;
}

export function cellAt(plan: ScreeningPlan, index: number): Cell {
	const pairs = pairsIn(plan);
	const pair = index % pairs;
	let rest = (index - pair) / pairs;
	const medium = rest % plan.media.length;
	rest = (rest - medium) / plan.media.length;
	const temperature = rest % plan.temperaturesK.length;
	const rule = (rest - temperature) / plan.temperaturesK.length;
	if (!plan.symmetric) {
		const right = pair % plan.right.length;
		return { rule, temperature, medium, right, left: (pair - right) / plan.right.length };
	}
	const left = rowOf(pair);
	return { rule, temperature, medium, left, right: pair - (left * (left + 1)) / 2 };
}

export function indexOf(plan: ScreeningPlan, { rule, temperature, medium, left, right }: Cell): number {
	const [high, low] = plan.symmetric && right > left ? [right, left] : [left, right];
	const pair = plan.symmetric ? (high * (high + 1)) / 2 + low : left * plan.right.length + right;
	return (
		((rule * plan.temperaturesK.length + temperature) * plan.media.length + medium) * pairsIn(plan) + pair
	);
}

/** Whether a rule for the static term has anything to say in a cell; where not, the first rule's numbers stand for it. */
export function ruleMatters(plan: ScreeningPlan, cell: Cell): boolean {
	const conducts = (of: number) => plan.materials[of].conducts;
	const body = ({ of, coating }: ScreeningPlan['left'][number]) =>
		conducts(of) || (coating !== undefined && conducts(coating.of));
	return body(plan.left[cell.left]) || body(plan.right[cell.right]);
}
