import type { Extra, ForceRequest, PermittivityModel } from './contract.ts';
import { LEVELS } from './lifshitz/level.ts';
import { matsubaraFrequency } from './lifshitz/matsubara.ts';
import { SPEED_OF_LIGHT } from './constants.ts';
import { partsOf } from './permittivity/temperature.ts';
import { roughnessNodes } from './shapes/roughness.ts';
import { metresFromNm } from './units.ts';

/** Seconds for one integrand of two half-spaces, for one layer more, and for one row of a table at one frequency. */
const SECONDS_AN_EVALUATION = 2.5e-8;
const SECONDS_A_LAYER = 1.5e-8;
const SECONDS_A_ROW = 1e-8;

/** Nodes over y of one frequency, both polarisations, per level. */
const NODES = [52, 64, 84];

/** Octaves of frequency that T = 0 asks for above c/(2 d), and below it c/(2 d), per level. */
const OCTAVES_ABOVE = 6;
const OCTAVES_BELOW = [16, 24, 32];

/** Of one band by quadrature, and of one oscillator spread by a normal distribution. */
const ROWS_A_BAND = 900;
const ROWS_A_SPREAD_TERM = 40;

/** Of a list far longer than any that is accepted, no more than this is looked at. */
const MOST_LOOKED_AT = 10_000;

/** Of one separation of half-spaces; layers weigh as much again. */
const SECONDS_AN_EXTRA: Record<Extra, number> = {
	breakdown: 0,
	analysis: 0,
	terms: 4e-3,
	sensitivity: 8e-3,
	uncertainty: 8e-3
};

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
	const count = Array.isArray(separationsNm) ? separationsNm.length : separationsNm.count;
	const [closest, farthest] = Array.isArray(separationsNm)
		? [
				Math.min(...separationsNm.slice(0, MOST_LOOKED_AT)),
				Math.max(...separationsNm.slice(0, MOST_LOOKED_AT))
			]
		: [separationsNm.from, separationsNm.to];
	const found = LEVELS.findIndex(({ reach }) => relativeAccuracy >= reach);
	const index = found < 0 ? LEVELS.length - 1 : found;
	const level = LEVELS[index];
	const bodies = [arrangement.left, arrangement.right];
	const layers = bodies.reduce((sum, body) => sum + body.layers.length, 0);
	const materials = [
		arrangement.medium,
		...bodies.flatMap((body) => [body.substrate, ...body.layers.map(({ of }) => of)])
	];
	const octavesAt = (separationNm: number): number => {
		const phase = (2 * metresFromNm(Math.max(separationNm, 1e-3))) / SPEED_OF_LIGHT;
		const first = phase * matsubaraFrequency(1, arrangement.temperatureK);
		return Math.min(22, Math.max(0, Math.log2(40 / first) - Math.log2(level.direct)));
	};
	const octaves =
		arrangement.temperatureK > 0
			? (octavesAt(closest) + octavesAt(farthest)) / 2
			: OCTAVES_ABOVE + OCTAVES_BELOW[index];
	const knots = materials.reduce((sum, { permittivity }) => sum + knotsOf(permittivity), 0);
	const frequencies = level.direct + level.nodes * (octaves + knots);
	const rough = roughnessNodes(arrangement.roughness);
	const line = arrangement.shape.kind === 'cylinderPlate' || arrangement.shape.kind === 'parallelCylinders';
	const evaluations = count * (line ? LINE_NODES : 1) * rough * frequencies * NODES[index];
	const rows = materials.reduce((sum, { permittivity }) => sum + rowsOf(permittivity), 0);
	const seconds =
		evaluations * (SECONDS_AN_EVALUATION + SECONDS_A_LAYER * layers) + frequencies * rows * SECONDS_A_ROW;
	const extra = count * (1 + layers) * request.include.reduce((sum, one) => sum + SECONDS_AN_EXTRA[one], 0);
	return {
		evaluations: Math.round(evaluations),
		seconds: seconds * (1 + (request.rivals?.length ?? 0)) + extra
	};
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
