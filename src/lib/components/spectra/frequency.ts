/** The same frequency as photon energy, angular frequency, and the separation it stands for: xi = c/2d. */

const PLANCK_J_S = 6.62607015e-34;
const CHARGE_C = 1.602176634e-19;
const LIGHT_M_PER_S = 299_792_458;
const BOLTZMANN_J_PER_K = 1.380649e-23;

const HBAR_J_S = PLANCK_J_S / (2 * Math.PI);

export const RAD_PER_S_PER_EV = CHARGE_C / HBAR_J_S;

export function energyEvOfXi(xiRadPerS: number): number {
	return xiRadPerS / RAD_PER_S_PER_EV;
}

/** c/2d, the frequency that weighs most at a separation. */
export function xiOfSeparation(separationNm: number): number {
	return LIGHT_M_PER_S / (2 * separationNm * 1e-9);
}

export function separationOfXi(xiRadPerS: number): number {
	return (LIGHT_M_PER_S / (2 * xiRadPerS)) * 1e9;
}

/** hbar c/2d. */
export function energyOfSeparation(separationNm: number): number {
	return energyEvOfXi(xiOfSeparation(separationNm));
}

export function separationOfEnergy(energyEv: number): number {
	return separationOfXi(energyEv * RAD_PER_S_PER_EV);
}

/** Vacuum wavelength. */
export function wavelengthUmOfEnergy(energyEv: number): number {
	return ((2 * Math.PI * LIGHT_M_PER_S) / (energyEv * RAD_PER_S_PER_EV)) * 1e6;
}

/** xi_n = 2 pi n k T/hbar. */
export function matsubaraXi(n: number, temperatureK: number): number {
	return (2 * Math.PI * n * BOLTZMANN_J_PER_K * temperatureK) / HBAR_J_S;
}
