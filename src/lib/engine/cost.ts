import type { Extra, ForceRequest, PermittivityModel } from './contract.ts';
import { LEVELS } from './lifshitz/level.ts';
import { matsubaraFrequency } from './lifshitz/matsubara.ts';
import { SPEED_OF_LIGHT } from './constants.ts';
import { isDressed } from './dress.ts';
import { partsOf } from './permittivity/temperature.ts';
import { roughnessNodes } from './shapes/roughness.ts';
import { metresFromNm } from './units.ts';

/**
 * Seconds for one integrand: of two half-spaces, more where there are layers at all, more for each of them; bodies with an
 * axis or a sheet go a slower way. For one row of a table at one frequency. Medians of `npm run bench`.
 */
const SECONDS_AN_EVALUATION = 2e-8;
const SECONDS_OF_LAYERING = 2.5e-8;
const SECONDS_A_LAYER = 6e-9;
const SECONDS_DRESSED = 1e-7;
const SECONDS_A_DRESSED_LAYER = 2.5e-8;
const SECONDS_A_ROW = 1e-8;

/** Nodes over y of one frequency, both polarisations, per level. */
const NODES = [52, 64, 84];

/** Phases that terms are followed to beyond the logarithm of the accuracy, and frequencies that only look at the tail. */
const PHASES_BEYOND = 4;
const LOOKS = 3.5;

/** Octaves of terms at most, however small a gap. */
const MOST_OCTAVES = 22;

/** Octaves of frequency that T = 0 asks for above c/(2 d), and below it c/(2 d), per level. */
const OCTAVES_ABOVE = 6;
const OCTAVES_BELOW = [16, 24, 32];

/** Separations that the mean of a request is taken over. */
const SAMPLES = 9;

/** Of one band by quadrature, and of one oscillator spread by a normal distribution. */
const ROWS_A_BAND = 900;
const ROWS_A_SPREAD_TERM = 40;

/** Derivatives of all places at one frequency: of half-spaces, and more for each layer. */
const SECONDS_A_RESPONSE = 2.5e-5;
const SECONDS_A_LAYER_OF_RESPONSE = 1.5e-5;

/** Terms that are listed one by one, and frequencies of the rule of derivatives: at first, and an octave. */
const LISTED_TERMS = 29;
const RESPONSES_AT_FIRST = 15;
const RESPONSES_AN_OCTAVE = 17;
const RESPONSE_PHASE = 60;
const RESPONSE_OCTAVES_AT_ZERO = 36;

/** Results with displaced materials beside an uncertainty, in units of the plain one; they are asked for more finely. */
const MOVED_RESULTS = 4;

/** A table is asked for itself and for its three parts. */
const PARTS_OF_A_TABLE = 4;

/** Plate evaluations behind one point of a line shape. */
const LINE_NODES = 24;

export interface Cost {
	/** Integrands to evaluate. */
	evaluations: number;
	/** On one core of an ordinary machine; an estimate within a factor of a few. */
	seconds: number;
}

/**
 * What a request will cost, from counts alone: nothing is computed, so that a caller can refuse or queue it first.
 * The request need not be valid; a nonsensical one gives a nonsensical but finite figure.
 */
export function estimateCost(request: ForceRequest): Cost {
	const { arrangement, separationsNm, relativeAccuracy } = request;
	const { temperatureK } = arrangement;
	const count = Array.isArray(separationsNm) ? separationsNm.length : separationsNm.count;
	const samples = sampled(separationsNm).map((nm) => Math.max(metresFromNm(nm), 1e-12));
	const found = LEVELS.findIndex(({ reach }) => relativeAccuracy >= reach);
	const index = found < 0 ? LEVELS.length - 1 : found;
	const level = LEVELS[index];
	const bodies = [arrangement.left, arrangement.right];
	const layers = bodies.reduce((sum, body) => sum + body.layers.length, 0);
	const materials = [
		arrangement.medium,
		...bodies.flatMap((body) => [body.substrate, ...body.layers.map(({ of }) => of)])
	];
	const first = (2 * matsubaraFrequency(1, temperatureK)) / SPEED_OF_LIGHT;
	const knots = materials.reduce((sum, { permittivity }) => sum + knotsOf(permittivity), 0);
	const frequenciesAt = (separation: number): number => {
		if (temperatureK <= 0) return level.direct + level.nodes * (OCTAVES_ABOVE + OCTAVES_BELOW[index] + knots);
		const terms = (PHASES_BEYOND - Math.log(relativeAccuracy)) / (first * separation);
		if (terms <= level.direct) return terms + LOOKS;
		return (
			level.direct + level.nodes * (Math.min(MOST_OCTAVES, Math.log2(terms / level.direct)) + knots) + LOOKS
		);
	};
	const responsesAt = (separation: number): number => {
		if (temperatureK <= 0) return RESPONSES_AN_OCTAVE * RESPONSE_OCTAVES_AT_ZERO;
		const octaves = Math.log2(RESPONSE_PHASE / (first * separation) / RESPONSES_AT_FIRST);
		return RESPONSES_AT_FIRST + RESPONSES_AN_OCTAVE * (Math.min(MOST_OCTAVES, Math.max(0, octaves)) + knots);
	};
	const frequencies = mean(samples.map(frequenciesAt));
	const rough = roughnessNodes(arrangement.roughness);
	const line = arrangement.shape.kind === 'cylinderPlate' || arrangement.shape.kind === 'parallelCylinders';
	const evaluations = count * (line ? LINE_NODES : 1) * rough * frequencies * NODES[index];
	const rows = materials.reduce(
		(sum, { permittivity, normal }) =>
			sum + rowsOf(permittivity) + (normal ? rowsOf(normal.permittivity) : 0),
		0
	);
	const perEvaluation = materials.some(isDressed)
		? SECONDS_DRESSED + SECONDS_A_DRESSED_LAYER * layers
		: SECONDS_AN_EVALUATION + (layers > 0 ? SECONDS_OF_LAYERING : 0) + SECONDS_A_LAYER * layers;
	// Frequencies are shared by all separations: the closest asks for the most.
	const tabulation = Math.max(0, ...samples.map(frequenciesAt)) * rows * SECONDS_A_ROW;
	const plain = evaluations * perEvaluation + tabulation;
	const response = SECONDS_A_RESPONSE + SECONDS_A_LAYER_OF_RESPONSE * layers;
	const derivatives =
		mean(samples.map(responsesAt)) * (response + PARTS_OF_A_TABLE * rows * SECONDS_A_ROW) +
		(plain * MOVED_RESULTS) / Math.max(1, count);
	const extras: Record<Extra, number> = {
		breakdown: 0,
		analysis: 0,
		terms: temperatureK > 0 ? LISTED_TERMS * response : 0,
		sensitivity: derivatives,
		uncertainty: derivatives
	};
	const extra = count * request.include.reduce((sum, one) => sum + extras[one], 0);
	return {
		evaluations: Math.round(evaluations),
		seconds: plain * (1 + (request.rivals?.length ?? 0)) + extra
	};
}

const mean = (values: number[]): number =>
	values.reduce((sum, one) => sum + one, 0) / Math.max(1, values.length);

/** Some of the separations, evenly over all of them. */
function sampled(separations: ForceRequest['separationsNm']): number[] {
	const places = Array.from({ length: SAMPLES }, (_, i) => i / (SAMPLES - 1));
	if (Array.isArray(separations))
		return separations.length <= SAMPLES
			? separations
			: places.map((place) => separations[Math.round(place * (separations.length - 1))]);
	const { from, to, spacing } = separations;
	return places.map((place) =>
		spacing === 'log' ? from * (to / from) ** place : from + (to - from) * place
	);
}

function rowsOf(model: PermittivityModel): number {
	return partsOf(model).reduce((sum, part) => sum + rowsOfPart(part), 0);
}

/** What one evaluation costs beside a row of a table. */
function rowsOfPart(part: PermittivityModel): number {
	if (part.kind === 'table') return 4 * part.energiesEv.length;
	if (part.kind === 'taucLorentz' || part.kind === 'codyLorentz') return ROWS_A_BAND * part.terms.length;
	return part.kind === 'brendelBormann' ? ROWS_A_SPREAD_TERM * part.terms.length : 1;
}

function knotsOf(model: PermittivityModel): number {
	return partsOf(model).reduce(
		(sum, part) => sum + (part.kind === 'imaginaryTable' ? part.frequenciesRadPerS.length : 0),
		0
	);
}
