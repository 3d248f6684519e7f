import { BOLTZMANN, REDUCED_PLANCK } from '../constants.ts';
import type {
	BoundedFigure,
	Elasticity,
	ForceRequest,
	MaterialModel,
	PermittivityModel,
	PlaceSensitivity,
	Sensitivity
} from '../contract.ts';
import type { PlateForces } from '../lifshitz/plates.ts';
import { tableShares, type TableModel } from '../permittivity/table.ts';
import type { Substance, System } from '../system.ts';
import { frequencyResponse, type FrequencyResponse } from './frequency-response.ts';
import { frequencyRule, summed, type RuleNode } from './frequency-rule.ts';
import { kernelOf } from './kernel.ts';

/** A place of the arrangement with what fills it, in the order of the derivatives. */
interface Place {
	path: string;
	material: MaterialModel;
	substance: Substance;
}

/** Both quantities at every frequency and at n = 0, in SI units, for one place. */
export interface PlaceDerivatives {
	freeEnergy: Float64Array;
	pressure: Float64Array;
	/** Half weight included; zero where the static term does not depend on it. */
	static: { freeEnergy: number; pressure: number };
}

/**
 * Places that derivatives are given for, left body first and from the gap outwards, the medium last; what lies behind an
 * ideal conductor is not seen.
 */
function placesOf(system: System, { arrangement }: ForceRequest): Place[] {
	const of = (side: 'left' | 'right'): Place[] => {
		const { layers, substrate } = arrangement[side];
		const all = [
			...layers.map((layer, i) => ({ path: `${side}.layers[${i}].of`, material: layer.of })),
			{ path: `${side}.substrate`, material: substrate }
		];
		return system[side].places.map((index, j) => ({ ...all[j], substance: system.substances[index] }));
	};
	const medium = { path: 'medium', material: arrangement.medium, substance: system.substances[0] };
	return [...of('left'), ...of('right'), medium];
}

/** What a separation's result depends on, prepared: derivatives and the rule that sums them. */
export interface SeparationResponse {
	nodes: RuleNode[];
	places: (Place & PlaceDerivatives)[];
	/** Largest error of a derivative over the largest derivative. */
	errorBound: number;
}

/**
 * Derivatives of free energy and pressure of smooth plates to eps(i xi) of each place, at the frequencies of a rule that
 * stands for all terms (methods.md section 10).
 *
 * @param separation  m
 */
export function separationResponse(
	system: System,
	request: ForceRequest,
	separation: number
): SeparationResponse {
	const responder = frequencyResponse(system, separation);
	const nodes = frequencyRule(system, separation);
	const perMode = system.temperature > 0 ? BOLTZMANN * system.temperature : REDUCED_PLANCK / (2 * Math.PI);
	const scale = perMode / (8 * Math.PI * separation ** 2);
	const scales = { freeEnergy: scale, pressure: -scale / separation };
	const found = nodes.map(({ xi }) => responder.at(xi));
	const zero = system.temperature > 0 ? responder.atZero() : null;
	const places = placesOf(system, request).map((place, index) => ({
		...place,
		freeEnergy: Float64Array.from(found, (one) => scales.freeEnergy * one.freeEnergyBy[index] + 0),
		pressure: Float64Array.from(found, (one) => scales.pressure * one.pressureBy[index] + 0),
		static: {
			freeEnergy: zero === null ? 0 : (scales.freeEnergy * zero.freeEnergyBy[index]) / 2 + 0,
			pressure: zero === null ? 0 : (scales.pressure * zero.pressureBy[index]) / 2 + 0
		}
	}));
	return { nodes, places, errorBound: worstError(zero === null ? found : [...found, zero]) };
}

function worstError(found: readonly FrequencyResponse[]): number {
	let worst = 0;
	for (const q of [0, 1] as const) {
		const by = (one: FrequencyResponse): Float64Array => (q === 0 ? one.freeEnergyBy : one.pressureBy);
		const largest = Math.max(0, ...found.map((one) => Math.max(...by(one).map(Math.abs))));
		const error = Math.max(0, ...found.map((one) => one.derivativeError[q]));
		if (largest > 0) worst = Math.max(worst, error / largest);
	}
	return worst;
}

/** Change of both quantities where eps - 1 of a place changes by `change(xi)`, to first order, with an absolute error. */
export function changeBy(
	{ nodes, errorBound }: Pick<SeparationResponse, 'nodes' | 'errorBound'>,
	place: PlaceDerivatives,
	change: (xi: number) => number,
	changeAtZero: number
): { freeEnergy: { value: number; error: number }; pressure: { value: number; error: number } } {
	const changes = nodes.map(({ xi }) => change(xi));
	const of = (quantity: 'freeEnergy' | 'pressure'): { value: number; error: number } => {
		const derivative = place[quantity];
		const { value, error } = summed(nodes, (i) => derivative[i] * changes[i]);
		const still = place.static[quantity] * changeAtZero;
		const size = nodes.reduce((sum, { fine }, i) => sum + Math.abs(fine * derivative[i] * changes[i]), 0);
		return { value: value + still, error: error + errorBound * (size + Math.abs(still)) };
	};
	return { freeEnergy: of('freeEnergy'), pressure: of('pressure') };
}

/**
 * What the numbers of one separation depend on: derivatives, their kernel over real frequency, elasticities, and for tables the
 * share that rests on each extrapolation. The rule of the n = 0 term of a conductor is a statement of its own and no part of it.
 *
 * @param forces  of the smooth plates at this separation
 */
export function sensitivity(
	system: System,
	request: ForceRequest,
	separation: number,
	forces: PlateForces
): Sensitivity {
	const response = separationResponse(system, request, separation);
	const fine = response.nodes.flatMap(({ fine }, i) => (fine > 0 ? [i] : []));
	return {
		xiRadPerS: fine.map((i) => response.nodes[i].xi),
		weight: fine.map((i) => response.nodes[i].fine),
		places: response.places
			.filter(({ substance }) => substance.chi !== null)
			.map((place) => placeSensitivity(place, response, fine, forces))
	};
}

function placeSensitivity(
	place: Place & PlaceDerivatives,
	response: SeparationResponse,
	fine: readonly number[],
	forces: PlateForces
): PlaceSensitivity {
	const { chi } = place.substance;
	if (chi === null) throw new RangeError('an ideal conductor has no permittivity to derive by');
	const elasticityOf = (change: (xi: number) => number, atZero: number): Elasticity => {
		const { freeEnergy, pressure } = changeBy(response, place, change, atZero);
		return {
			...named('freeEnergy', freeEnergy, forces.value[0], forces.bound[0]),
			...named('pressure', pressure, forces.value[1], forces.bound[1])
		};
	};
	const tables = tablesIn(place.material.permittivity).map(tableShares);
	const part = (which: 'below' | 'inside' | 'above'): Elasticity =>
		elasticityOf(
			(xi) => tables.reduce((sum, table) => sum + table[which](xi), 0),
			tables.reduce((sum, table) => sum + table.atZero[which], 0)
		);
	const still = place.static;
	return {
		place: place.path,
		freeEnergyJPerM2: fine.map((i) => place.freeEnergy[i]),
		pressurePa: fine.map((i) => place.pressure[i]),
		...(still.freeEnergy === 0 && still.pressure === 0
			? {}
			: { static: { freeEnergyJPerM2: still.freeEnergy, pressurePa: still.pressure } }),
		errorBound: response.errorBound,
		elasticity: elasticityOf(chi.atXi, chi.atZero.finite),
		kernel: kernelOf(response, place, chi, forces),
		...(tables.length === 0
			? {}
			: { reliance: { below: part('below'), inside: part('inside'), above: part('above') } })
	};
}

function tablesIn(model: PermittivityModel): TableModel[] {
	if (model.kind === 'sum') return model.of.flatMap(tablesIn);
	return model.kind === 'table' ? [model] : [];
}

/** A change over its total; absent where the total is not known from zero. */
function named<N extends string>(
	name: N,
	{ value, error }: { value: number; error: number },
	total: number,
	bound: number
): Partial<Record<N, BoundedFigure>> {
	if (total === 0 || !(bound < Math.abs(total))) return {};
	const ratio = value / total + 0;
	const relative = error === 0 ? 0 : error / Math.abs(value);
	const errorBound = Math.min(Number.MAX_VALUE, relative + bound / (Math.abs(total) - bound));
	return { [name]: { value: ratio, errorBound } } as Partial<Record<N, BoundedFigure>>;
}
