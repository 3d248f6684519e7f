import { energyOfSeparation, separationOfEnergy } from '../spectra/frequency.ts';

/** The library's hairline: an energy on the shared axis that stands for the separation with hbar c/2d = that energy. */

export const SEPARATION_NM = { min: 1, max: 90_000, first: 100 } as const;

export const HAIRLINE_EV = {
	min: energyOfSeparation(SEPARATION_NM.max),
	max: energyOfSeparation(SEPARATION_NM.min)
} as const;

/** One press of an arrow moves by one per cent, with shift by a third of a decade. */
const SMALL_STEP = 1.01;
const LARGE_STEP = 10 ** (1 / 3);

function held(energyEv: number): number {
	return Math.min(HAIRLINE_EV.max, Math.max(HAIRLINE_EV.min, energyEv));
}

export function heldSeparationNm(separationNm: number): number {
	return Math.min(SEPARATION_NM.max, Math.max(SEPARATION_NM.min, separationNm));
}

/** The separation for a place on the axis. */
export function separationAtEnergy(energyEv: number): number {
	return separationOfEnergy(held(energyEv));
}

/**
 * Where a key moves the line to, in nm, or null for a key that is none of its own.
 * Right and up move along the drawn axis: to a higher energy, so to a smaller separation.
 */
export function separationAfterKey(separationNm: number, key: string, shift: boolean): number | null {
	const energyEv = energyOfSeparation(separationNm);
	const step = shift ? LARGE_STEP : SMALL_STEP;
	switch (key) {
		case 'ArrowRight':
		case 'ArrowUp':
			return separationAtEnergy(energyEv * step);
		case 'ArrowLeft':
		case 'ArrowDown':
			return separationAtEnergy(energyEv / step);
		case 'PageUp':
			return separationAtEnergy(energyEv * LARGE_STEP);
		case 'PageDown':
			return separationAtEnergy(energyEv / LARGE_STEP);
		case 'Home':
			return SEPARATION_NM.max;
		case 'End':
			return SEPARATION_NM.min;
		default:
			return null;
	}
}
