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
 * the sum over frequencies leaves open. For uncertainties beyond some ten per cent the first order itself is coarse.
 *
 * @param separation  m
 */
export function pointUncertainty(
	system: System,
	request: ForceRequest,
	separation: number
): PointUncertainty {
	const response = separationResponse(system, request, separation);
	const groups = new Map<string, { material: MaterialModel; uncertainty: Uncertainty; places: number[] }>();
	response.places.forEach(({ material }, index) => {
		const { permittivity, uncertainty } = material;
		if (uncertainty === undefined) return;
		const key = JSON.stringify([permittivity, uncertainty]);
		const known = groups.get(key) ?? { material, uncertainty, places: [] };
		known.places.push(index);
		groups.set(key, known);
	});
	const found = [...groups.values()].map(({ material, uncertainty, places }) => {
		const of = (quantity: Quantity, rule: 'fine' | 'coarse'): number =>
			Math.sqrt(variance(material, uncertainty, response, carried(response, places, quantity, rule)));
		return {
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
	return {
		freeEnergyJPerM2: total('freeEnergy'),
		pressurePa: total('pressure'),
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

function variance(
	{ permittivity, zeroFrequency }: MaterialModel,
	uncertainty: Uncertainty,
	{ nodes }: SeparationResponse,
	{ byNode, still, plasma }: Carried
): number {
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
			return (uncertainty.relative * change(chiOf(permittivity))) ** 2;
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
			return uncertainty.correlation === 'common'
				? changes.reduce((sum, one) => sum + one, 0) ** 2
				: changes.reduce((sum, one) => sum + one * one, 0);
		}
		case 'parameters': {
			const slopes = uncertainty.names.map((name) => change(byParameter(permittivity, name, chiOf)));
			const sum = slopes.reduce(
				(total, a, i) => total + slopes.reduce((row, b, j) => row + a * uncertainty.covariance[i][j] * b, 0),
				0
			);
			return Math.max(0, sum);
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
