import type { PermittivityModel } from '../../../engine/contract.ts';
import { Refusal } from '../../../engine/refusal.ts';
import { permittivityIssues } from '../../../engine/validate-permittivity.ts';
import { permittivityOnImaginaryAxis } from '../../../engine/permittivity/evaluator.ts';
import { evFromRadPerS } from '../../../engine/units.ts';
import type { Thumbnail } from '../../../schemas/upload-preview.ts';
import { drudeEpsilon2 } from './joints.ts';
import type { MappedTable } from './map-columns.ts';

/** A small picture of what a table reads as: eps'' with its ends on the real axis, eps(i xi) on the imaginary one. */

const POINTS_MAX = 300;

export function thumbnail(table: MappedTable): Thumbnail {
	const { model, rows, measuredRangeEv, given } = table;
	return {
		points: rows && thinned(rows.energiesEv.map((energy, index) => [energy, rows.epsilon2[index]])),
		...endsOf(model),
		imaginary: imaginary(model),
		rowCount: given.abscissa.length,
		measuredRangeEv
	};
}

function thinned<T>(points: T[]): T[] {
	if (points.length <= POINTS_MAX) return points;
	const step = (points.length - 1) / (POINTS_MAX - 1);
	return Array.from({ length: POINTS_MAX }, (_, index) => points[Math.round(index * step)]);
}

const decades = (from: number, to: number, count: number): number[] =>
	Array.from({ length: count }, (_, index) => from * (to / from) ** (index / (count - 1)));

function endsOf(model: MappedTable['model']): Pick<Thumbnail, 'below' | 'above'> {
	if (model.kind !== 'table') return { below: [], above: [] };
	const { energiesEv, epsilon2, lowEnd, highEnd } = model;
	const last = energiesEv.length - 1;
	const below = decades(energiesEv[0] / 100, energiesEv[0], 30).flatMap((energy): [number, number][] => {
		if (lowEnd.kind === 'drude')
			return [[energy, drudeEpsilon2(energy, lowEnd.plasmaEnergyEv, lowEnd.dampingEv)]];
		if (lowEnd.kind === 'power') return [[energy, epsilon2[0] * (energy / energiesEv[0]) ** lowEnd.exponent]];
		return [];
	});
	const above = decades(energiesEv[last], energiesEv[last] * 10, 20).flatMap((energy): [number, number][] =>
		highEnd.kind === 'power'
			? [[energy, epsilon2[last] * (energy / energiesEv[last]) ** -highEnd.exponent]]
			: []
	);
	return { below, above };
}

/** A closed form has its imaginary axis to show; the ideal conductor has none. */
export function modelThumbnail(model: PermittivityModel): Thumbnail {
	const prepared = preparedModel(model);
	return {
		points: null,
		below: [],
		above: [],
		imaginary: prepared.kind === 'idealConductor' ? [] : imaginary(prepared),
		rowCount: null,
		measuredRangeEv: null
	};
}

/** @throws Refusal for what the engine would not compute with */
function preparedModel(model: PermittivityModel): PermittivityModel {
	const issues = permittivityIssues(model, 'model');
	if (issues.length > 0) throw new Refusal(issues);
	return model;
}

function imaginary(model: PermittivityModel): Thumbnail['imaginary'] {
	const epsilon = permittivityOnImaginaryAxis(model);
	return decades(1e13, 1e17, 60).map((xi) => [evFromRadPerS(xi), epsilon(xi)]);
}
