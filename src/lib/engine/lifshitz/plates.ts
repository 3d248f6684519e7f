import { BOLTZMANN, REDUCED_PLANCK } from '../constants.ts';
import type { System } from '../system.ts';
import { matsubaraSum } from './matsubara-sum.ts';
import { LEVELS, type Level } from './level.ts';
import type { Quantities } from './polarization-sum.ts';
import { newTally, valueOf, type Tally } from './tally.ts';
import { zeroTemperatureIntegral } from './zero-temperature.ts';
import { zeroTerm } from './zero-term.ts';

/** Free energy per area (J/m^2), pressure (Pa) and dP/dd (Pa/m) of two plates; negative energy and pressure attract. */
export interface PlateForces {
	value: [number, number, number];
	/** Bound on the true error of each, absolute. */
	bound: [number, number, number];
	/** For each quantity: zero TE, zero TM, TE, TM. */
	parts: Float64Array;
	/** Sum of magnitudes over magnitude of the sum. */
	cancellation: [number, number, number];
	/** Part of the bound that finer rules cannot lower. */
	roundingShare: [number, number, number];
	evaluations: number;
}

/** Prefactors of the reduced sums: signs and powers of d of methods.md section 1. */
const scales = (system: System, separation: number): [number, number, number] => {
	const perMode = system.temperature > 0 ? BOLTZMANN * system.temperature : REDUCED_PLANCK / (2 * Math.PI);
	const area = perMode / (8 * Math.PI * separation * separation);
	return [area, -area / separation, area / separation / separation];
};

/**
 * Energy, pressure and gradient of two layered bodies at one separation (methods.md sections 1 to 3): one sweep over
 * frequencies and y gives all three. Climbs the levels until the bound meets the accuracy asked for.
 *
 * @param quantities  `pressure` leaves energy and gradient at zero and asks the accuracy of the pressure alone
 * @returns (separation in m, > 0) => forces; the bound covers integration over y, summation over frequencies, the
 *          tail and rounding, not the optical data
 */
export function plates(
	system: System,
	relativeAccuracy: number,
	quantities: Quantities = 'all'
): (separation: number) => PlateForces {
	const first = LEVELS.findIndex(({ reach }) => relativeAccuracy >= reach);
	const climbs = LEVELS.slice(first).map((level) => once(() => atLevel(system, level, quantities)));
	return (separation) => {
		let best = climbs[0]()(separation, relativeAccuracy);
		for (let i = 1; i < climbs.length && !meets(best, relativeAccuracy); i++) {
			const spent = best.evaluations;
			best = climbs[i]()(separation, relativeAccuracy);
			best.evaluations += spent;
		}
		return best;
	};
}

/** Levels that are never reached are never set up. */
function once<T>(make: () => T): () => T {
	let made: T | undefined;
	return () => (made ??= make());
}

export const meets = ({ value, bound }: PlateForces, relativeAccuracy: number): boolean =>
	value.every((one, q) => bound[q] <= relativeAccuracy * Math.abs(one));

/** One separation at one level, whatever its bound turns out to be. */
export function atLevel(
	system: System,
	level: Level,
	quantities: Quantities
): (separation: number, accuracy: number) => PlateForces {
	const sum =
		system.temperature > 0
			? matsubaraSum(system, level, quantities)
			: zeroTemperatureIntegral(system, level, quantities);
	const zero = system.temperature > 0 ? zeroTerm(system, level, quantities) : null;
	return (separation, accuracy) => {
		const tally = newTally();
		zero?.(separation, tally);
		sum(separation, accuracy, tally);
		return forces(tally, scales(system, separation));
	};
}

function forces(tally: Tally, scale: [number, number, number]): PlateForces {
	const values = [0, 1, 2].map((q) => valueOf(tally, q));
	const bound = (q: number): number =>
		Math.abs(scale[q]) * (tally.lattice[q] + tally.blocks[q] + tally.tail[q] + tally.rounding[q]);
	// Adding zero turns -0 into 0: nothing has no sign.
	const inUnits = (sum: number, q: number): number => scale[q] * sum + 0;
	return {
		value: [inUnits(values[0], 0), inUnits(values[1], 1), inUnits(values[2], 2)],
		bound: [bound(0), bound(1), bound(2)],
		parts: tally.parts.map((part, i) => inUnits(part, Math.floor(i / 4))),
		cancellation: [0, 1, 2].map((q) =>
			tally.magnitude[q] === 0 ? 1 : tally.magnitude[q] / Math.abs(values[q])
		) as [number, number, number],
		roundingShare: [0, 1, 2].map((q) => (Math.abs(scale[q]) * tally.rounding[q]) / bound(q)) as [
			number,
			number,
			number
		],
		evaluations: tally.evaluations
	};
}
