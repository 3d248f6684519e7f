import type { Criterion, ScreeningPlan } from '../schemas/screening.ts';
import { cellAt, cellsIn, indexOf, ruleMatters, type Cell } from './cells.ts';
import { coatingFigure, FIGURES, judge, spreadFigure, windowOf } from './criteria.ts';

/** Cells gathered by what bodies and medium they are of, whatever the data; judged, and put in order. */

export interface Matrix {
	pressures: Float64Array;
	bounds: Float32Array;
	done: Uint8Array;
}

export interface Group {
	/** The cell whose data the result is stated for. */
	cell: number;
	qualifies: boolean;
	figure: number | null;
	/** Of the figure over all data combinations. */
	low: number | null;
	high: number | null;
	/** Data combinations, the stated one included. */
	combinations: number;
	/** One a separation: the share of combinations whose pressure has the sign of the stated one. */
	signCertainty: number[];
}

/** Best first. */
export type Ranking = Group[];

interface Gathered {
	reference: number;
	cells: number[];
}

/** Number of the group of a cell; of an unordered pair, the larger number first. */
function groupKey(plan: ScreeningPlan, cell: Cell): string {
	const [left, right] = [plan.left[cell.left].group, plan.right[cell.right].group];
	const [first, second] = plan.symmetric && right > left ? [right, left] : [left, right];
	return `${cell.temperature} ${plan.media[cell.medium].group} ${first} ${second}`;
}

/** Numbers of a cell; of a rule that has nothing to say there, those of the first rule. */
export function pressuresOf(plan: ScreeningPlan, { pressures }: Matrix, index: number): number[] {
	const count = plan.separationsNm.length;
	const from = sourceOf(plan, index);
	return Array.from(pressures.subarray(from * count, (from + 1) * count));
}

export function boundsOf(plan: ScreeningPlan, { bounds }: Matrix, index: number): number[] {
	const count = plan.separationsNm.length;
	const from = sourceOf(plan, index);
	return Array.from(bounds.subarray(from * count, (from + 1) * count));
}

function sourceOf(plan: ScreeningPlan, index: number): number {
	const cell = cellAt(plan, index);
	return cell.rule > 0 && !ruleMatters(plan, cell) ? indexOf(plan, { ...cell, rule: 0 }) : index;
}

const CELLS_AT_ONCE = 20_000;

/**
 * @param rest  called now and then, so that whoever ranks can do something else in between
 */
export async function rankedGroups(
	plan: ScreeningPlan,
	criterion: Criterion,
	matrix: Matrix,
	rest: () => Promise<unknown> = () => Promise.resolve()
): Promise<Ranking> {
	const gathered = new Map<string, Gathered>();
	const total = cellsIn(plan);
	for (let index = 0; index < total; index += 1) {
		if (index % CELLS_AT_ONCE === CELLS_AT_ONCE - 1) await rest();
		if (matrix.done[index] === 0) continue;
		const cell = cellAt(plan, index);
		// A rule without a say would count the same numbers twice.
		if (cell.rule > 0 && !ruleMatters(plan, cell)) continue;
		const key = groupKey(plan, cell);
		const group = gathered.get(key) ?? { reference: -1, cells: [] };
		group.cells.push(index);
		const stated =
			cell.rule === 0 &&
			plan.left[cell.left].reference &&
			plan.right[cell.right].reference &&
			plan.media[cell.medium].reference;
		if (stated) group.reference = index;
		gathered.set(key, group);
	}
	const within = windowOf(criterion, plan.separationsNm);
	const groups: Group[] = [];
	let count = 0;
	for (const group of gathered.values()) {
		count += 1;
		if (count % 5000 === 0) await rest();
		// While it runs, the stated cell may not be there yet.
		if (group.reference >= 0) groups.push(groupOf(plan, criterion, matrix, group, within));
	}
	if (criterion.kind === 'mostPerCoating') judgeCoatings(plan, matrix, groups, within);
	return groups.sort(inOrder(criterion));
}

function groupOf(
	plan: ScreeningPlan,
	criterion: Criterion,
	matrix: Matrix,
	{ reference, cells }: Gathered,
	within: readonly number[]
): Group {
	const stated = pressuresOf(plan, matrix, reference);
	const all = cells.map((index) => pressuresOf(plan, matrix, index));
	const signCertainty = stated.map((value, place) => {
		const known = all.filter((one) => !Number.isNaN(one[place]));
		return known.length === 0
			? 0
			: known.filter((one) => Math.sign(one[place]) === Math.sign(value)).length / known.length;
	});
	const extreme = (pick: (...values: number[]) => number) =>
		stated.map((_, place) => pick(...all.map((one) => one[place]).filter((value) => !Number.isNaN(value))));
	const judged =
		criterion.kind === 'leastSpread'
			? spreadFigure(stated, extreme(Math.min), extreme(Math.max), within)
			: judge(criterion, plan.separationsNm, stated, within);
	const figures =
		criterion.kind === 'leastSpread'
			? []
			: all.flatMap((one) => judge(criterion, plan.separationsNm, one, within).figure ?? []);
	return {
		cell: reference,
		...judged,
		low: figures.length > 0 ? Math.min(...figures) : null,
		high: figures.length > 0 ? Math.max(...figures) : null,
		combinations: cells.length,
		signCertainty
	};
}

/** Against the next thicker film of the same arrangement, of either side. */
function judgeCoatings(
	plan: ScreeningPlan,
	matrix: Matrix,
	groups: Group[],
	within: readonly number[]
): void {
	const series = new Map<string, { group: Group; thicknessNm: number }[]>();
	for (const group of groups) {
		const cell = cellAt(plan, group.cell);
		const left = plan.left[cell.left];
		const right = plan.right[cell.right];
		const film = left.coating ?? right.coating;
		if (!film) continue;
		const other = left.coating ? right : left;
		const key = [
			cell.temperature,
			plan.media[cell.medium].of,
			left.of,
			right.of,
			film.of,
			other.coating?.thicknessNm ?? ''
		].join(' ');
		series.set(key, [...(series.get(key) ?? []), { group, thicknessNm: film.thicknessNm }]);
	}
	for (const films of series.values()) {
		films.sort((a, b) => a.thicknessNm - b.thicknessNm);
		for (let place = 0; place + 1 < films.length; place += 1) {
			const [thin, thick] = [films[place], films[place + 1]];
			const figure = coatingFigure(
				{ pressures: pressuresOf(plan, matrix, thin.group.cell), thicknessNm: thin.thicknessNm },
				{ pressures: pressuresOf(plan, matrix, thick.group.cell), thicknessNm: thick.thicknessNm },
				within
			);
			Object.assign(thin.group, { figure, qualifies: figure !== null });
		}
	}
}

function inOrder(criterion: Criterion) {
	const sign = FIGURES[criterion.kind].best === 'most' ? -1 : 1;
	return (one: Group, other: Group): number => {
		if (one.qualifies !== other.qualifies) return one.qualifies ? -1 : 1;
		if (one.figure === null || other.figure === null)
			return Number(one.figure === null) - Number(other.figure === null) || one.cell - other.cell;
		return sign * (one.figure - other.figure) || one.cell - other.cell;
	};
}
