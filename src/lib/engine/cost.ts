import type { ForceRequest, PermittivityModel } from './contract.ts';
import { LEVELS } from './lifshitz/level.ts';
import { matsubaraFrequency } from './lifshitz/matsubara.ts';
import { SPEED_OF_LIGHT } from './constants.ts';
import { metresFromNm } from './units.ts';

/** Seconds for one integrand of two half-spaces, for one layer more, and for one row of a table at one frequency. */
const SECONDS_AN_EVALUATION = 2e-8;
const SECONDS_A_LAYER = 4e-8;
const SECONDS_A_ROW = 2e-8;

/** Nodes over y of one frequency, both polarisations, per level. */
const NODES = [52, 76, 110];

/** Octaves of frequency that T = 0 asks for below c/(2 d), per level. */
const OCTAVES_BELOW = [12, 18, 24];

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
	const closest = Array.isArray(separationsNm)
		? separationsNm.reduce((least, one) => Math.min(least, one), Infinity)
		: separationsNm.from;
	const found = LEVELS.findIndex(({ reach }) => relativeAccuracy >= reach);
	const index = found < 0 ? LEVELS.length - 1 : found;
	const level = LEVELS[index];
	const bodies = [arrangement.left, arrangement.right];
	const layers = bodies.reduce((sum, body) => sum + body.layers.length, 0);
	const materials = [
		arrangement.medium,
		...bodies.flatMap((body) => [body.substrate, ...body.layers.map(({ of }) => of)])
	];
	const phase = (2 * metresFromNm(Math.max(closest, 1e-3))) / SPEED_OF_LIGHT;
	const octaves =
		arrangement.temperatureK > 0
			? Math.min(22, Math.max(2, Math.log2(40 / (phase * matsubaraFrequency(1, arrangement.temperatureK)))))
			: 6 + OCTAVES_BELOW[index];
	const knots = materials.reduce((sum, { permittivity }) => sum + knotsOf(permittivity), 0);
	const frequencies = level.direct + level.nodes * (octaves + knots);
	const line = arrangement.shape.kind === 'cylinderPlate' || arrangement.shape.kind === 'parallelCylinders';
	const evaluations = count * (line ? LINE_NODES : 1) * frequencies * NODES[index];
	const rows = materials.reduce((sum, { permittivity }) => sum + rowsOf(permittivity), 0);
	const seconds =
		evaluations * (SECONDS_AN_EVALUATION + SECONDS_A_LAYER * layers) + frequencies * rows * SECONDS_A_ROW;
	return { evaluations: Math.round(evaluations), seconds };
}

function rowsOf(model: PermittivityModel): number {
	if (model.kind === 'sum') return model.of.reduce((sum, part) => sum + rowsOf(part), 0);
	return model.kind === 'table' ? 4 * model.energiesEv.length : 1;
}

function knotsOf(model: PermittivityModel): number {
	if (model.kind === 'sum') return model.of.reduce((sum, part) => sum + knotsOf(part), 0);
	return model.kind === 'imaginaryTable' ? model.frequenciesRadPerS.length : 0;
}
