import { movedBy, type SliderKey } from '../plot/hairline.ts';
import { energyOfSeparation, separationOfEnergy } from '../spectra/frequency.ts';

/** The library's hairline: an energy on the shared axis that stands for the separation with hbar c/2d = that energy. */

export const SEPARATION_NM = { min: 1, max: 90_000, first: 100 } as const;

export const HAIRLINE_EV = {
	min: energyOfSeparation(SEPARATION_NM.max),
	max: energyOfSeparation(SEPARATION_NM.min)
} as const;

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
 * Where a key moves the line to, in nm; undefined for a key that is none of its own. Right moves along the drawn axis:
 * to a higher energy, so to a smaller separation.
 */
export function separationAfterKey(separationNm: number, key: SliderKey): number | undefined {
	const energyEv = movedBy(key, energyOfSeparation(separationNm), HAIRLINE_EV.min, HAIRLINE_EV.max);
	return energyEv === undefined ? undefined : separationOfEnergy(energyEv);
}
