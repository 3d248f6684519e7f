import { ELEMENTARY_CHARGE, REDUCED_PLANCK, SPEED_OF_LIGHT } from './constants.ts';

/** rad/s that belong to hbar*omega = 1 eV. */
export const RAD_PER_S_PER_EV = ELEMENTARY_CHARGE / REDUCED_PLANCK;

/** Photon energy hbar*omega in eV to angular frequency in rad/s. */
export const radPerSFromEv = (energyEv: number): number => energyEv * RAD_PER_S_PER_EV;

/** Angular frequency in rad/s to photon energy in eV. */
export const evFromRadPerS = (omega: number): number => omega / RAD_PER_S_PER_EV;

/** Ordinary frequency in Hz to angular frequency in rad/s. */
export const radPerSFromHz = (hertz: number): number => 2 * Math.PI * hertz;

/** Wave number in cm^-1 to angular frequency in rad/s. */
export const radPerSFromPerCm = (perCm: number): number => 2 * Math.PI * SPEED_OF_LIGHT * 100 * perCm;

/** Vacuum wavelength in m to angular frequency in rad/s (and back: the relation is its own inverse). */
export const radPerSFromWavelength = (wavelength: number): number =>
	(2 * Math.PI * SPEED_OF_LIGHT) / wavelength;

export const metresFromNm = (nm: number): number => nm * 1e-9;
export const nmFromMetres = (metres: number): number => metres * 1e9;
export const metresFromUm = (um: number): number => um * 1e-6;
export const secondsFromPs = (ps: number): number => ps * 1e-12;
