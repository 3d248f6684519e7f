import { BOLTZMANN } from '../constants.ts';
import type { BoundedFigure, Terms, TermSeries } from '../contract.ts';
import { matsubaraFrequency } from '../lifshitz/matsubara.ts';
import type { PlateForces } from '../lifshitz/plates.ts';
import type { System } from '../system.ts';
import { frequencyResponse } from './frequency-response.ts';

/** Terms given one by one, n = 0 among them. */
const FIRST = 30;

/**
 * The sum of one separation by its Matsubara terms, and what warmth adds to T = 0 with the same models. Terms n >= 1 come from
 * integrals of their own; the rest is the total less what is listed, so that all parts add up.
 *
 * @param forces  of the smooth plates
 * @param cold    of the same plates at T = 0; null where the request is for T = 0 itself
 */
export function terms(
	system: System,
	separation: number,
	forces: PlateForces,
	cold: PlateForces | null
): Terms {
	if (cold === null) return { thermalShare: shares(forces, forces) };
	const responder = frequencyResponse(system, separation);
	const found = Array.from({ length: FIRST - 1 }, (_, i) =>
		responder.at(matsubaraFrequency(i + 1, system.temperature))
	);
	const scale = (BOLTZMANN * system.temperature) / (8 * Math.PI * separation ** 2);
	const series = (q: 0 | 1): TermSeries => {
		const factor = q === 0 ? scale : -scale / separation;
		const later = found.map((one) => factor * (q === 0 ? one.freeEnergy : one.pressure) + 0);
		const first = [forces.parts[4 * q] + forces.parts[4 * q + 1], ...later];
		const errors = found.reduce((sum, one) => sum + one.valueError[q], 0);
		return {
			first,
			rest: forces.value[q] - first.reduce((sum, one) => sum + one, 0) + 0,
			errorBound: forces.bound[q] + Math.abs(factor) * errors
		};
	};
	return {
		freeEnergyJPerM2: series(0),
		pressurePa: series(1),
		thermalShare: shares(forces, cold)
	};
}

function shares(warm: PlateForces, cold: PlateForces): Terms['thermalShare'] {
	const of = (q: 0 | 1): BoundedFigure | undefined => {
		const [value, bound] = [warm.value[q], warm.bound[q]];
		if (value === 0 || !(bound < Math.abs(value))) return undefined;
		if (warm === cold) return { value: 0, errorBound: 0 };
		const difference = value - cold.value[q];
		const share = difference / value;
		const error = (bound + cold.bound[q]) / (Math.abs(value) - bound);
		return { value: share + 0, errorBound: Math.min(Number.MAX_VALUE, error / Math.abs(share)) };
	};
	const [freeEnergy, pressure] = [of(0), of(1)];
	return { ...(freeEnergy ? { freeEnergy } : {}), ...(pressure ? { pressure } : {}) };
}
