import type { ForceRequest, MaterialModel, PermittivityModel, Uncertainty } from '../contract.ts';
import { plates, type PlateForces } from '../lifshitz/plates.ts';
import type { Susceptibility } from '../permittivity/susceptibility.ts';
import { substanceOf, systemOf, type Substance } from '../system.ts';
import { parameterAt, withParameter } from './model-parameters.ts';

/**
 * What is moved is moved by half its own size at most, so that every model stays a model; beyond that departures are taken to
 * grow with the third power of the move.
 */
const LARGEST_MOVE = 0.5;

/** Accuracy of results that are compared: their differences are wanted to a digit or two, whatever was asked for. */
export const COMPARED_ACCURACY = 1e-8;

/** One standard deviation of a material, in the direction that moves the result most. */
export type Move =
	| { kind: 'scale'; relative: number }
	/** Relative change of eps'' of each point of a table. */
	| { kind: 'points'; relative: number[] }
	| { kind: 'parameters'; names: string[]; change: number[] };

/**
 * How far results depart from first-order propagation where a material is displaced both ways by one standard deviation
 * wherever it stands: |X(+-) - X -+ deviation|, the larger of both, for free energy and pressure. To leading order that is the
 * second order of the move, or the third where the second happens to vanish.
 *
 * @param material    as it stands in the request, with its uncertainty
 * @param deviations  of free energy and pressure to first order
 * @param own         of the arrangement as it is, to the accuracy of comparison
 */
export function departure(
	request: ForceRequest,
	separation: number,
	material: MaterialModel,
	move: Move,
	deviations: readonly number[],
	own: PlateForces
): [freeEnergy: number, pressure: number] {
	const largest = largestMove(material.permittivity, move);
	if (largest === 0) return [0, 0];
	const step = Math.min(1, LARGEST_MOVE / largest);
	const [above, below] = [step, -step].map((factor) => {
		const system = systemOf(
			request,
			sourceWith(material, (model) => moved(model, move, factor))
		);
		return plates(system, COMPARED_ACCURACY)(separation);
	});
	const of = (q: 0 | 1): number => {
		const straight = Math.sign(above.value[q] - below.value[q]) * step * deviations[q];
		const up = Math.abs(above.value[q] - own.value[q] - straight);
		const down = Math.abs(below.value[q] - own.value[q] + straight);
		return Math.max(up, down) / step ** 3;
	};
	return [of(0), of(1)];
}

function largestMove(model: PermittivityModel, move: Move): number {
	if (move.kind === 'scale') return move.relative;
	if (move.kind === 'points') return Math.max(...move.relative.map(Math.abs));
	return Math.max(...move.names.map((name, i) => Math.abs(relativeChange(model, name, move.change[i]))));
}

/** A parameter that is zero has no room on one side: it stays. */
function relativeChange(model: PermittivityModel, name: string, change: number): number {
	const at = parameterAt(model, name) ?? 0;
	return at === 0 ? 0 : change / at;
}

/** What a displaced material is made of. */
function moved(material: MaterialModel, move: Move, factor: number): Substance {
	const { permittivity } = material;
	const as = (model: PermittivityModel): Substance => substanceOf({ ...material, permittivity: model });
	switch (move.kind) {
		case 'scale': {
			const substance = as(permittivity);
			const by = 1 + factor * move.relative;
			return substance.chi === null ? substance : { ...substance, chi: scaled(substance.chi, by) };
		}
		case 'points':
			if (permittivity.kind !== 'table') throw new RangeError('points of a table without a table');
			return as({
				...permittivity,
				epsilon2: permittivity.epsilon2.map((value, i) => value * (1 + factor * move.relative[i]))
			});
		case 'parameters':
			return as(
				move.names.reduce((model, name, i) => {
					const at = parameterAt(permittivity, name) ?? 0;
					return at === 0 ? model : withParameter(model, name, at + factor * move.change[i]);
				}, permittivity)
			);
	}
}

const scaled = (chi: Susceptibility, by: number): Susceptibility => ({
	...chi,
	atXi: (xi) => by * chi.atXi(xi),
	atZero: {
		finite: by * chi.atZero.finite,
		slope: by * chi.atZero.slope,
		square: by * chi.atZero.square,
		plasmaSquared: by * chi.atZero.plasmaSquared
	}
});

/** Substances as always, but for one material wherever it stands. */
function sourceWith(
	{ permittivity, uncertainty }: MaterialModel,
	displaced: (material: MaterialModel) => Substance
): (material: MaterialModel) => Substance {
	const key = keyOf(permittivity, uncertainty);
	const known = new Map<string, Substance>();
	return (material) => {
		const own = JSON.stringify([
			keyOf(material.permittivity, material.uncertainty),
			material.permeability ?? null
		]);
		const moves = keyOf(material.permittivity, material.uncertainty) === key;
		const substance = known.get(own) ?? (moves ? displaced(material) : substanceOf(material));
		known.set(own, substance);
		return substance;
	};
}

/** Places with the same model and the same uncertainty hold one material. */
export const keyOf = (permittivity: PermittivityModel, uncertainty: Uncertainty | undefined): string =>
	JSON.stringify([permittivity, uncertainty ?? null]);
