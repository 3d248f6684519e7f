import { BOLTZMANN, REDUCED_PLANCK } from '../constants.ts';

/** xi_n = 2 pi n kB T/hbar in rad/s (methods.md section 0). */
export const matsubaraFrequency = (n: number, temperature: number): number =>
	(2 * Math.PI * n * BOLTZMANN * temperature) / REDUCED_PLANCK;
