import { describe, expect, it } from 'vitest';
import type { ForcePoint } from '../contract.ts';
import type { PlateForces } from '../lifshitz/plates.ts';
import { equilibriaBetween } from './equilibrium.ts';

/** P = (d - 20 nm)(50 nm - d) times a falling power: unstable at 20 nm, stable at 50 nm. */
function plates(separation: number): PlateForces {
	const d = separation * 1e9;
	const rise = (d - 20) * (50 - d);
	const pressure = rise / d ** 4;
	const slope = ((70 - 2 * d) / d ** 4 - (4 * rise) / d ** 5) * 1e9;
	return {
		value: [0, pressure, slope],
		bound: [0, 1e-14, 0],
		parts: new Float64Array(12),
		cancellation: [1, 1, 1],
		roundingShare: [0, 0, 0],
		evaluations: 0
	};
}

function pointAt(separationNm: number, bound = 1e-8): ForcePoint {
	const { value } = plates(separationNm * 1e-9);
	return {
		separationNm,
		freeEnergyJPerM2: value[0],
		pressurePa: value[1],
		pressureGradientPaPerM: value[2],
		errorBound: { freeEnergy: bound, pressure: bound, pressureGradient: bound },
		met: true
	};
}

describe('equilibriaBetween', () => {
	it('finds each change of sign and says whether it is stable', () => {
		const found = equilibriaBetween(
			[60, 10, 30, 45].map((d) => pointAt(d)),
			plates
		);
		expect(found.map(({ separationNm }) => separationNm)).toEqual([
			expect.closeTo(20, 6),
			expect.closeTo(50, 6)
		]);
		expect(found.map(({ stable }) => stable)).toEqual([false, true]);
		expect(found[1].stiffnessPaPerM).toBeLessThan(0);
	});

	it('trusts no point whose sign is not certain', () => {
		expect(equilibriaBetween([pointAt(10, 2), pointAt(30)], plates)).toEqual([]);
	});
});
