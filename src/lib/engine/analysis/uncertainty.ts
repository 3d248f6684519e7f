import type {
	BoundedFigure,
	ForceRequest,
	MaterialModel,
	PointUncertainty,
	Spread,
	Uncertainty
} from '../contract.ts';
import type { PlateForces } from '../lifshitz/plates.ts';
import { susceptibility } from '../permittivity/evaluator.ts';
import { tableShares } from '../permittivity/table.ts';
import { zeroFrequencyMaterial } from '../reflection/zero-frequency.ts';
import type { System } from '../system.ts';
import { byParameter } from './model-parameters.ts';
import { departure, keyOf, type Move } from './beyond-first-order.ts';
import { separationResponse, type SeparationResponse } from './sensitivity.ts';
import { interpolated, resultByPoint } from './table-weights.ts';

/** Derivatives of one quantity to eps(i xi) at the nodes, summed over the places of a material; weights of a rule included. */
interface Carried {
	byNode: number[];
	still: number;
	/** To the square of the plasma frequency at n = 0, (rad/s)^-2. */
	plasma: number;
}

type Quantity = 'freeEnergy' | 'pressure';

/**
 * Standard uncertainty of free energy and pressure from what is stated about the data, to first order (methods.md section
 * 10). Places that hold the same material move together; different materials are independent. `errorBound` is numerical: what
 * the sum over frequencies leaves open. What the first order itself leaves out is `beyondFirstOrder`, by displaced materials.
 *
 * @param separation  m
 * @param forces      of the smooth plates, to the accuracy of comparison
 */
export function pointUncertainty(
	system: System,
	request: ForceRequest,
	separation: number,
	forces: PlateForces
): PointUncertainty {
	const response = separationResponse(system, request, separation);
	const groups = new Map<string, { material: MaterialModel; uncertainty: Uncertainty; places: number[] }>();
	response.places.forEach(({ material }, index) => {
		const { permittivity, uncertainty } = material;
		if (uncertainty === undefined) return;
		const key = keyOf(permittivity, uncertainty);
		const known = groups.get(key) ?? { material, uncertainty, places: [] };
		known.places.push(index);
		groups.set(key, known);
	});
	const found = [...groups.values()].map(({ material, uncertainty, places }) => {
		const of = (quantity: Quantity, rule: 'fine' | 'coarse'): number =>
			spreadOf(material, uncertainty, response, carried(response, places, quantity, rule)).deviation;
		const deviations = [of('freeEnergy', 'fine'), of('pressure', 'fine')];
		const beyond = (['freeEnergy', 'pressure'] as const).map((quantity, q) => {
			const { move } = spreadOf(material, uncertainty, response, carried(response, places, quantity, 'fine'));
			return departure(request, separation, material, move, deviations, forces)[q];
		});
		return {
			beyond,
			places: places.map((index) => response.places[index].path),
			freeEnergy: [of('freeEnergy', 'fine'), of('freeEnergy', 'coarse')],
			pressure: [of('pressure', 'fine'), of('pressure', 'coarse')]
		};
	});
	const total = (quantity: Quantity): BoundedFigure => {
		const [fine, coarse] = [0, 1].map((rule) => Math.hypot(0, ...found.map((one) => one[quantity][rule])));
		const errorBound = fine === 0 ? 0 : Math.abs(fine - coarse) / fine + response.errorBound;
		return { value: fine, errorBound };
	};
	const [freeEnergyJPerM2, pressurePa] = [total('freeEnergy'), total('pressure')];
	const share = (q: 0 | 1, deviation: number): number =>
		deviation === 0 ? 0 : found.reduce((sum, { beyond }) => sum + beyond[q], 0) / deviation;
	return {
		freeEnergyJPerM2,
		pressurePa,
		beyondFirstOrder: { freeEnergy: share(0, freeEnergyJPerM2.value), pressure: share(1, pressurePa.value) },
		contributions: found.map(({ places, freeEnergy, pressure }) => ({
			places,
			freeEnergyJPerM2: freeEnergy[0],
			pressurePa: pressure[0]
		}))
	};
}

function carried(
	{ nodes, places }: SeparationResponse,
	indices: readonly number[],
	quantity: Quantity,
	rule: 'fine' | 'coarse'
): Carried {
	const byNode = nodes.map((node, k) =>
		indices.reduce((sum, index) => sum + node[rule] * places[index][quantity][k], 0)
	);
	const sum = (of: (place: SeparationResponse['places'][number]) => number): number =>
		indices.reduce((total, index) => total + of(places[index]), 0);
	return {
		byNode,
		still: sum((place) => place.static[quantity]),
		plasma: sum(({ plasma, plasmaSquare }) => (plasmaSquare === 0 ? 0 : plasma[quantity] / plasmaSquare))
	};
}

/** Standard deviation of a result, and the move of the material by one of its own that makes the result move so. */
function spreadOf(
	{ permittivity, zeroFrequency }: MaterialModel,
	uncertainty: Uncertainty,
	{ nodes }: SeparationResponse,
	{ byNode, still, plasma }: Carried
): { deviation: number; move: Move } {
	/** Change of the result by a change of eps - 1 given at the nodes and, last, at xi = 0: what stays finite, then carriers. */
	const change = (chi: readonly number[]): number =>
		byNode.reduce(
			(sum, derivative, k) => sum + derivative * chi[k],
			still * chi[byNode.length] + plasma * chi[byNode.length + 1]
		);
	const chiOf = (model: MaterialModel['permittivity']): number[] => {
		const { atXi, atZero } = susceptibility(model);
		const { square } = zeroFrequencyMaterial(atZero, 1, zeroFrequency);
		return [...nodes.map(({ xi }) => atXi(xi)), atZero.finite, square];
	};
	switch (uncertainty.kind) {
		case 'scale':
			return {
				deviation: Math.abs(uncertainty.relative * change(chiOf(permittivity))),
				move: { kind: 'scale', relative: uncertainty.relative }
			};
		case 'table': {
			if (permittivity.kind !== 'table') throw new RangeError('uncertainties of a table without a table');
			const shares = tableShares(permittivity);
			const points = resultByPoint(
				permittivity,
				nodes,
				{
					below: nodes.map(({ xi }) => shares.below(xi)),
					above: nodes.map(({ xi }) => shares.above(xi)),
					atZero: shares.atZero
				},
				byNode,
				still
			);
			const relative = interpolated(uncertainty.energiesEv, uncertainty.relative, permittivity.energiesEv);
			const changes = points.map((point, i) => point * relative[i]);
			if (uncertainty.correlation === 'common') {
				const together = changes.reduce((sum, one) => sum + one, 0);
				return { deviation: Math.abs(together), move: { kind: 'points', relative } };
			}
			const deviation = Math.hypot(0, ...changes);
			const alongSlope = relative.map((one, i) => (deviation === 0 ? 0 : (one * changes[i]) / deviation));
			return { deviation, move: { kind: 'points', relative: alongSlope } };
		}
		case 'parameters': {
			const slopes = uncertainty.names.map((name) => change(byParameter(permittivity, name, chiOf)));
			const moves = uncertainty.covariance.map((row) => row.reduce((sum, c, j) => sum + c * slopes[j], 0));
			const deviation = Math.sqrt(
				Math.max(
					0,
					moves.reduce((sum, one, i) => sum + one * slopes[i], 0)
				)
			);
			const along = moves.map((one) => (deviation === 0 ? 0 : one / deviation));
			return { deviation, move: { kind: 'parameters', names: uncertainty.names, change: along } };
		}
	}
}

/** Lowest and highest over the arrangement itself and its rivals, each computed in full. */
export function spreadOver(own: PlateForces, rivals: readonly PlateForces[]): Spread {
	const all = [own, ...rivals];
	const range = (q: 0 | 1): Spread['pressurePa'] => ({
		low: Math.min(...all.map(({ value }) => value[q])),
		high: Math.max(...all.map(({ value }) => value[q])),
		errorBound: Math.max(
			...all.map(({ value, bound }) =>
				bound[q] === 0 ? 0 : Math.min(Number.MAX_VALUE, bound[q] / Math.abs(value[q]))
			)
		)
	});
	return {
		freeEnergyJPerM2: range(0),
		pressurePa: range(1),
		rivals: rivals.map(({ value }) => ({ freeEnergyJPerM2: value[0], pressurePa: value[1] }))
	};
}
