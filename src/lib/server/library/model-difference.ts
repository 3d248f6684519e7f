import type { PermittivityModel } from '../../engine/contract.ts';
import type { FigureChange, ModelDifference, RowChange } from '../../schemas/comparison.ts';

/** What one model has otherwise than another, figure by figure and row by row. */

const ROWS_SHOWN = 60;

export function modelDifference(first: PermittivityModel, second: PermittivityModel): ModelDifference {
	const [before, after] = [figuresOf(first), figuresOf(second)];
	const paths = [...new Set([...before.keys(), ...after.keys()])];
	const figures = paths
		.filter((path) => before.get(path) !== after.get(path))
		.map((path) => changeOf(path, before.get(path), after.get(path)));
	return { figures, ...rowDifference(first, second) };
}

/** Every figure and word of a model by its path; the rows of tables are compared on their own. */
function figuresOf(model: PermittivityModel): Map<string, number | string> {
	const found = new Map<string, number | string>();
	const walk = (value: unknown, path: string) => {
		if (typeof value === 'number' || typeof value === 'string') found.set(path, value);
		else if (Array.isArray(value)) value.forEach((one, index) => walk(one, `${path}[${index + 1}]`));
		else if (typeof value === 'object' && value !== null) {
			for (const [name, one] of Object.entries(value)) {
				if (ROW_FIELDS.has(name)) continue;
				walk(one, path === '' ? name : `${path}.${name}`);
			}
		}
	};
	walk(model, '');
	return found;
}

const ROW_FIELDS = new Set(['energiesEv', 'epsilon2', 'frequenciesRadPerS', 'epsilon']);

function changeOf(
	path: string,
	from: number | string | undefined,
	to: number | string | undefined
): FigureChange {
	const numbers = typeof from === 'number' && typeof to === 'number' ? ([from, to] as const) : null;
	return {
		path,
		from: from ?? null,
		to: to ?? null,
		percent: numbers && numbers[0] !== 0 ? 100 * (numbers[1] / numbers[0] - 1) : null,
		slip: numbers && slipBetween(...numbers)
	};
}

/** What a hand or an eye may have done to a number; null where it looks like another number altogether. */
export function slipBetween(from: number, to: number): FigureChange['slip'] {
	if (from === 0 || to === 0) return null;
	if (from === -to) return 'sign';
	const power = Math.log10(Math.abs(to / from));
	if (Math.round(power) !== 0 && Math.abs(power - Math.round(power)) < 1e-9) return 'decimal point';
	const [first, second] = [String(Math.abs(from)), String(Math.abs(to))];
	if (first.length !== second.length) return null;
	const places = [...first].flatMap((digit, index) => (digit === second[index] ? [] : [index]));
	const [a, b] = places;
	if (places.length === 2 && b === a + 1 && first[a] === second[b] && first[b] === second[a])
		return 'digits exchanged';
	return places.length === 1 ? 'one digit' : null;
}

/** Abscissa and ordinate of what is a table; a closed form has none. */
function rowsOf(model: PermittivityModel): Map<number, number> | null {
	if (model.kind === 'table')
		return new Map(model.energiesEv.map((energy, index) => [energy, model.epsilon2[index]]));
	if (model.kind === 'imaginaryTable')
		return new Map(model.frequenciesRadPerS.map((xi, index) => [xi, model.epsilon[index]]));
	return null;
}

function rowDifference(
	first: PermittivityModel,
	second: PermittivityModel
): Pick<ModelDifference, 'rows' | 'rowCounts'> {
	const [before, after] = [rowsOf(first), rowsOf(second)];
	if (!before || !after || first.kind !== second.kind) return { rows: [], rowCounts: null };
	const changes: RowChange[] = [...new Set([...before.keys(), ...after.keys()])]
		.sort((a, b) => a - b)
		.flatMap((at) => {
			const [from, to] = [before.get(at) ?? null, after.get(at) ?? null];
			if (from === to) return [];
			const percent = from !== null && to !== null && from !== 0 ? 100 * (to / from - 1) : null;
			return [{ at, from, to, percent }];
		});
	return {
		rows: [...changes]
			.sort((a, b) => Math.abs(b.percent ?? Infinity) - Math.abs(a.percent ?? Infinity))
			.slice(0, ROWS_SHOWN),
		rowCounts: {
			first: before.size,
			second: after.size,
			changed: changes.filter(({ from, to }) => from !== null && to !== null).length,
			added: changes.filter(({ from }) => from === null).length,
			removed: changes.filter(({ to }) => to === null).length
		}
	};
}
