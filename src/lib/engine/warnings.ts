import type { BodyOf, ForcePoint, ForceRequest, Heights, MaterialModel, Warning } from './contract.ts';
import { matsubaraFrequency } from './lifshitz/matsubara.ts';
import { ENGINE_LIMITS } from './limits.ts';
import { susceptibility } from './permittivity/evaluator.ts';
import { conducts } from './permittivity/susceptibility.ts';
import { closestSeparationNm } from './shapes/roughness.ts';
import { ionsStated, ionTreatment } from './system.ts';
import { outsideRange, partsOf, thermalParts } from './permittivity/temperature.ts';
import { epsilonShares, type TableModel } from './permittivity/table.ts';

/** d/R above which the proximity approximation is worse than the percent level, and where it stops being one. */
const CURVED = 0.01;
const TOO_CURVED = 0.1;
/** Relative estimate per d/R is of order one: the flags look at the estimate of the contract. */
const FILM_NM = 50;
/** Share of eps(i xi) - 1 outside a table that is worth a word. */
const RELIANCE = 0.1;

interface Place {
	name: string;
	material: MaterialModel;
	thicknessNm?: number;
}

/** What a reader of the answer ought to know; one warning a subject. */
export function warningsFor(request: ForceRequest, points: readonly ForcePoint[]): Warning[] {
	const { arrangement } = request;
	const places: Place[] = [
		...placesOf('left', arrangement.left),
		{ name: 'medium', material: arrangement.medium },
		...placesOf('right', arrangement.right)
	];
	return [
		...belowContinuum(points),
		...curvature(request, points),
		...roughness(request),
		...notMet(points),
		...beyondFirstOrder(points),
		...reliance(places, arrangement.temperatureK),
		...imaginaryReach(places, arrangement.temperatureK),
		...neverFalling(places),
		...temperature(places, arrangement.temperatureK),
		...sheets(places, arrangement.temperatureK),
		...(arrangement.temperatureK > 0 ? zeroFrequency(request, places) : [])
	];
}

function placesOf(side: string, body: BodyOf<MaterialModel>): Place[] {
	const layers = body.layers.map(({ of, thicknessNm }, i) => ({
		name: `layer ${i + 1} of the ${side} body`,
		material: of,
		thicknessNm
	}));
	return [...layers, { name: `substrate of the ${side} body`, material: body.substrate }];
}

function belowContinuum(points: readonly ForcePoint[]): Warning[] {
	const close = points.filter(({ separationNm }) => separationNm < ENGINE_LIMITS.continuumNm);
	if (close.length === 0) return [];
	return [
		{
			code: 'below-continuum',
			text: `Below ${ENGINE_LIMITS.continuumNm} nm atoms count: a permittivity of the bulk and a sharp face are no longer meaningful (${close.length} of ${points.length} points).`
		}
	];
}

function curvature({ arrangement: { shape } }: ForceRequest, points: readonly ForcePoint[]): Warning[] {
	const radii = Object.entries(shape).flatMap(([name, value]) =>
		name === 'kind' ? [] : [Number(value) * 1e3]
	);
	if (radii.length === 0 || points.length === 0) return [];
	const largest = Math.max(...points.map(({ separationNm }) => separationNm)) / Math.min(...radii);
	if (largest <= CURVED) return [];
	const text =
		largest > TOO_CURVED
			? `d/R reaches ${largest.toPrecision(2)}: beyond ${TOO_CURVED} the proximity approximation is no prediction.`
			: `d/R reaches ${largest.toPrecision(2)}: the proximity approximation is off by more than a percent there.`;
	return [{ code: 'curvature', text }];
}

function roughness({ arrangement }: ForceRequest): Warning[] {
	if (arrangement.roughness === undefined) return [];
	const cut = Object.values(arrangement.roughness).some((heights: Heights) => heights.kind === 'rms')
		? ' An rms stands for a normal distribution cut at six standard deviations: 2e-9 of it is left out.'
		: '';
	return [
		{
			code: 'roughness',
			text: `Averaged over heights, which holds for roughness that is long beside the separation; shorter correlation raises the correction. Refused below ${closestSeparationNm(arrangement.roughness).toPrecision(3)} nm.${cut}`
		}
	];
}

function notMet(points: readonly ForcePoint[]): Warning[] {
	const missed = points.filter(({ met }) => !met).length;
	if (missed === 0) return [];
	return [
		{
			code: 'accuracy',
			text: `The accuracy asked for was not reached at ${missed} of ${points.length} points; each says why.`
		}
	];
}

/** Departure from the first order, as a share of it, from which on a band is called coarse. */
const SECOND_ORDER = 0.2;

function beyondFirstOrder(points: readonly ForcePoint[]): Warning[] {
	const shares = points.flatMap(({ uncertainty }) =>
		uncertainty?.beyondFirstOrder
			? [Math.max(uncertainty.beyondFirstOrder.freeEnergy, uncertainty.beyondFirstOrder.pressure)]
			: []
	);
	const large = shares.filter((share) => share >= SECOND_ORDER).length;
	if (large === 0) return [];
	const worst = Math.max(...shares);
	return [
		{
			code: 'uncertainty-order',
			text: `What is stated about the data is so uncertain that displaced results depart from the first order by ${(100 * worst).toPrecision(2)} % of it (at ${large} of ${points.length} points it is above ${100 * SECOND_ORDER} %): the bands there are coarse. Compare rival data instead.`
		}
	];
}

/** The first Matsubara frequency is where the low end of a table is felt most; at T = 0 that of room temperature stands in. */
const lowestXi = (temperatureK: number): number =>
	matsubaraFrequency(1, temperatureK > 0 ? temperatureK : 300);

function reliance(places: Place[], temperatureK: number): Warning[] {
	const xi = lowestXi(temperatureK);
	const told = new Set<string>();
	for (const { name, material } of places) {
		for (const model of partsOf(material.permittivity)) {
			if (model.kind !== 'table') continue;
			const { below, above } = epsilonShares(model as TableModel, xi);
			if (below > RELIANCE)
				told.add(`${Math.round(100 * below)} % of eps - 1 of the ${name} comes from below its table`);
			if (above > RELIANCE)
				told.add(`${Math.round(100 * above)} % of eps - 1 of the ${name} comes from above its table`);
		}
	}
	if (told.size === 0) return [];
	return [{ code: 'reliance', text: `At the lowest frequency that counts, ${[...told].join('; ')}.` }];
}

function imaginaryReach(places: Place[], temperatureK: number): Warning[] {
	const xi = lowestXi(temperatureK);
	const short = places.filter(({ material }) =>
		partsOf(material.permittivity).some(
			(model) => model.kind === 'imaginaryTable' && model.frequenciesRadPerS[0] > xi * (1 + 1e-9)
		)
	);
	if (short.length === 0) return [];
	const names = short.map(({ name }) => name).join(', ');
	return [
		{
			code: 'table-reach',
			text: `The table of eps(i xi) of ${names} starts above the first frequency needed; its first value is used below.`
		}
	];
}

function neverFalling(places: Place[]): Warning[] {
	const flat = places.filter(({ material }) =>
		partsOf(material.permittivity).some((model) => model.kind === 'constant' && model.value > 1)
	);
	if (flat.length === 0) return [];
	const names = flat.map(({ name }) => name).join(', ');
	return [
		{
			code: 'constant-permittivity',
			text: `The permittivity of ${names} never falls to one: forces at short distances are overstated.`
		}
	];
}

function temperature(places: Place[], temperatureK: number): Warning[] {
	const told = new Set<string>();
	for (const { name, material } of places) {
		const models = [material.permittivity, ...(material.normal ? [material.normal.permittivity] : [])];
		for (const model of models.flatMap(thermalParts)) {
			if (outsideRange(model, temperatureK))
				told.add(
					`the ${name} is meant for ${model.rangeK.from} to ${model.rangeK.to} K and held at the nearer end`
				);
		}
	}
	if (told.size === 0) return [];
	return [{ code: 'temperature', text: `At ${temperatureK} K ${[...told].join('; ')}.` }];
}

function sheets(places: Place[], temperatureK: number): Warning[] {
	const covered = places.filter(({ material }) => material.sheet !== undefined);
	if (covered.length === 0 || temperatureK === 0) return [];
	const names = covered.map(({ name }) => name).join(', ');
	return [
		{
			code: 'conducting-sheet',
			text: `At n = 0 the sheet on the ${names} reflects like bulk metal whatever its conductivity: an artefact of a local response.`
		}
	];
}

function zeroFrequency({ arrangement }: ForceRequest, places: Place[]): Warning[] {
	const warnings: Warning[] = [];
	const conducting = places.filter(({ material: { permittivity, zeroFrequency } }) =>
		permittivity.kind === 'idealConductor' || zeroFrequency === 'dcIgnored'
			? false
			: zeroFrequency === 'dcCounted' || conducts(susceptibility(permittivity).atZero)
	);
	const bodies = conducting.filter(({ name }) => name !== 'medium');
	const unstated = bodies.filter(({ material }) => material.zeroFrequency === undefined);
	if (unstated.length > 0) {
		const names = unstated.map(({ name }) => name).join(', ');
		warnings.push({
			code: 'zero-frequency-default',
			text: `The n = 0 term of ${names} follows the model as written; measurements disagree on the Drude and the plasma rule, so compare both.`
		});
	}
	const films = bodies.filter(
		({ material, thicknessNm }) =>
			material.zeroFrequency !== 'dcCounted' &&
			thicknessNm !== undefined &&
			thicknessNm < FILM_NM &&
			susceptibilityOf(material).square === 0 &&
			material.zeroFrequency !== 'plasma'
	);
	if (films.length > 0) {
		const names = films.map(({ name }) => name).join(', ');
		warnings.push({
			code: 'thin-conductor',
			text: `At n = 0 the Drude rule makes ${names} reflect like bulk metal whatever its thickness: an artefact of a local response.`
		});
	}
	const dc = bodies.filter(({ material }) => susceptibilityOf(material).plasmaSquared === 0);
	if (dc.length > 0) {
		const names = dc.map(({ name }) => name).join(', ');
		warnings.push({
			code: 'dc-conductivity',
			text: `The dc conductivity of ${names} makes its n = 0 reflection that of a metal; whether to include it is a physical decision.`
		});
	}
	const ions = ionTreatment(arrangement);
	if (ions === 'off') {
		warnings.push({
			code: 'ionic-screening',
			text: 'The n = 0 TM term is left out, as if ions screened it at every separation.'
		});
	} else if (ions === 'screened') {
		warnings.push({
			code: 'ionic-screening',
			text: 'Ions screen the n = 0 TM term in a local description; a non-local one predicts an additional part that is not screened.'
		});
	} else if (!ionsStated(arrangement) && conducting.some(({ name }) => name === 'medium')) {
		warnings.push({
			code: 'conducting-medium',
			text: 'The medium conducts: its n = 0 term follows the stated rule without screening by ions.'
		});
	}
	return warnings;
}

const susceptibilityOf = ({ permittivity }: MaterialModel): { square: number; plasmaSquared: number } =>
	susceptibility(permittivity).atZero;
