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
import type { ZeroFrequencyMaterial } from '../reflection/zero-frequency.ts';
import {
	frequencyResponse,
	type FrequencyResponse,
	type Responder,
	type Slots
} from './frequency-response.ts';
import { frequencyRule, summed, type RuleNode } from './frequency-rule.ts';
import { kernelOf } from './kernel.ts';

/** A place of the arrangement with what fills it, in the order of the derivatives. */
interface Place {
	path: string;
	material: MaterialModel;
	substance: Substance;
	/** Where its derivatives stand, and those of a sheet on it. */
	slot: number;
	sheet: number | null;
	/** Place of its undamped carriers at n = 0; along the normal there are none that count. */
	carriers: ZeroFrequencyMaterial | null;
}

/** Both quantities at every frequency and at n = 0, in SI units, for one place. */
export interface PlaceDerivatives {
	freeEnergy: Float64Array;
	pressure: Float64Array;
	/** Half weight included; zero where the static term does not depend on it. */
	static: { freeEnergy: number; pressure: number };
	/** Of the n = 0 TE term to the logarithm of the square of the plasma frequency, half weight included. */
	plasma: { freeEnergy: number; pressure: number };
	/** (rad/s)^2 that the derivative above belongs to. */
	plasmaSquare: number;
}

/**
 * Places that derivatives are given for, left body first and from the gap outwards, then the medium, then permittivities
 * along the normal of uniaxial places; what lies behind an ideal conductor is not seen.
 */
function placesOf(system: System, { arrangement }: ForceRequest, [left, right]: Responder['slots']): Place[] {
	const alongNormals: Place[] = [];
	const of = (side: 'left' | 'right', slots: Slots): Place[] => {
		const { layers, substrate } = arrangement[side];
		const body = system[side];
		const all = [
			...layers.map((layer, i) => ({ path: `${side}.layers[${i}].of`, material: layer.of })),
			{ path: `${side}.substrate`, material: substrate }
		];
		return body.places.map((index, j) => {
			const { path, material } = all[j];
			const normal = body.dress?.normals[j] ?? index;
			if (slots.normal !== null && normal !== index && material.normal !== undefined)
				alongNormals.push({
					path: `${path}.normal`,
					material: { permittivity: material.normal.permittivity },
					substance: system.substances[normal],
					slot: slots.normal + j,
					sheet: null,
					carriers: null
				});
			const covered = slots.sheet !== null && (body.dress?.sheets[j] ?? null) !== null;
			return {
				path,
				material,
				substance: system.substances[index],
				slot: slots.own + j,
				sheet: covered && slots.sheet !== null ? slots.sheet + j : null,
				carriers: body.zero[j + 1]
			};
		});
	};
	const bodies = [...of('left', left), ...of('right', right)];
	const medium = {
		path: 'medium',
		material: arrangement.medium,
		substance: system.substances[0],
		slot: bodies.length,
		sheet: null,
		carriers: null
	};
	return [...bodies, medium, ...alongNormals];
}

/** What a separation's result depends on, prepared: derivatives and the rule that sums them. */
export interface SeparationResponse {
	nodes: RuleNode[];
	places: (Place &
		PlaceDerivatives & { bySheet: Pick<PlaceDerivatives, 'freeEnergy' | 'pressure'> | null })[];
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
	const plasma = system.temperature > 0 ? responder.plasmaAtZero() : null;
	const halfOf = (one: FrequencyResponse | null, slot: number): { freeEnergy: number; pressure: number } => ({
		freeEnergy: one === null ? 0 : (scales.freeEnergy * one.freeEnergyBy[slot]) / 2 + 0,
		pressure: one === null ? 0 : (scales.pressure * one.pressureBy[slot]) / 2 + 0
	});
	const rows = (slot: number): { freeEnergy: Float64Array; pressure: Float64Array } => ({
		freeEnergy: Float64Array.from(found, (one) => scales.freeEnergy * one.freeEnergyBy[slot] + 0),
		pressure: Float64Array.from(found, (one) => scales.pressure * one.pressureBy[slot] + 0)
	});
	const nothing = { freeEnergy: 0, pressure: 0 };
	const places = placesOf(system, request, responder.slots).map((place) => ({
		...place,
		...rows(place.slot),
		static: halfOf(zero, place.slot),
		plasma: place.carriers === null ? nothing : halfOf(plasma, place.slot),
		plasmaSquare: place.carriers?.square ?? 0,
		bySheet: place.sheet === null ? null : rows(place.sheet)
	}));
	const all = [...found, ...[zero, plasma].filter((one) => one !== null)];
	return { nodes, places, errorBound: worstError(all) };
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

/**
 * Change of both quantities where eps - 1 of a place changes by `change(xi)`, to first order, with an absolute error.
 *
 * @param changeOfPlasma  relative change of the square of the plasma frequency that counts at n = 0
 */
export function changeBy(
	{ nodes, errorBound }: Pick<SeparationResponse, 'nodes' | 'errorBound'>,
	place: PlaceDerivatives,
	change: (xi: number) => number,
	changeAtZero: number,
	changeOfPlasma = 0
): { freeEnergy: { value: number; error: number }; pressure: { value: number; error: number } } {
	const changes = nodes.map(({ xi }) => change(xi));
	const of = (quantity: 'freeEnergy' | 'pressure'): { value: number; error: number } => {
		const derivative = place[quantity];
		const { value, error } = summed(nodes, (i) => derivative[i] * changes[i]);
		const still = place.static[quantity] * changeAtZero + place.plasma[quantity] * changeOfPlasma;
		const size = nodes.reduce((sum, { fine }, i) => sum + Math.abs(fine * derivative[i] * changes[i]), 0);
		return { value: value + still, error: error + errorBound * (size + Math.abs(still)) };
	};
	return { freeEnergy: of('freeEnergy'), pressure: of('pressure') };
}

/**
 * What the numbers of one separation depend on: derivatives, their kernel over real frequency, elasticities, and for tables the
 * share that rests on each extrapolation. Whether a conductor counts at n = 0 is a statement of its own and no part of it.
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

/** A sheet reflects the static TM term wholly and the TE term not at all, whatever it conducts. */
const NOTHING_STATIC = {
	static: { freeEnergy: 0, pressure: 0 },
	plasma: { freeEnergy: 0, pressure: 0 },
	plasmaSquare: 0
};

function placeSensitivity(
	place: SeparationResponse['places'][number],
	response: SeparationResponse,
	fine: readonly number[],
	forces: PlateForces
): PlaceSensitivity {
	const { chi } = place.substance;
	if (chi === null) throw new RangeError('an ideal conductor has no permittivity to derive by');
	const named = ({ freeEnergy, pressure }: ReturnType<typeof changeBy>): Elasticity => ({
		...share('freeEnergy', freeEnergy, forces.value[0], forces.bound[0]),
		...share('pressure', pressure, forces.value[1], forces.bound[1])
	});
	const elasticityOf = (change: (xi: number) => number, atZero: number, ofPlasma = 0): Elasticity =>
		named(changeBy(response, place, change, atZero, ofPlasma));
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
		elasticity: elasticityOf(chi.atXi, chi.atZero.finite, 1),
		...(place.bySheet === null
			? {}
			: {
					sheet: named(changeBy(response, { ...NOTHING_STATIC, ...place.bySheet }, () => 1, 0))
				}),
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
function share<N extends string>(
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
