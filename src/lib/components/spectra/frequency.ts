import { BOLTZMANN, REDUCED_PLANCK, SPEED_OF_LIGHT } from '../../engine/constants.ts';
import {
	evFromRadPerS,
	metresFromNm,
	nmFromMetres,
	radPerSFromEv,
	radPerSFromWavelength
} from '../../engine/units.ts';

/** The same frequency as angular frequency, photon energy, wavelength, and the separation it stands for: xi = c/2d. */

/** c/2d, the frequency that weighs most at a separation. */
export function xiOfSeparation(separationNm: number): number {
	return SPEED_OF_LIGHT / (2 * metresFromNm(separationNm));
}

export function separationOfXi(xiRadPerS: number): number {
	return nmFromMetres(SPEED_OF_LIGHT / (2 * xiRadPerS));
}

/** hbar c/2d. */
export function energyOfSeparation(separationNm: number): number {
	return evFromRadPerS(xiOfSeparation(separationNm));
}

export function separationOfEnergy(energyEv: number): number {
	return separationOfXi(radPerSFromEv(energyEv));
}

export function wavelengthUmOfEnergy(energyEv: number): number {
	return radPerSFromWavelength(radPerSFromEv(energyEv)) * 1e6;
}

/** xi_n = 2 pi n k T/hbar. */
export function matsubaraXi(n: number, temperatureK: number): number {
	return (2 * Math.PI * n * BOLTZMANN * temperatureK) / REDUCED_PLANCK;
}
