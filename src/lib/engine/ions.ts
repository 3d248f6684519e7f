import { AVOGADRO, BOLTZMANN, ELEMENTARY_CHARGE, VACUUM_PERMITTIVITY } from './constants.ts';

const LITRES_PER_M3 = 1000;

/**
 * Debye length of a z:z electrolyte in m: sqrt(eps_0 eps kB T/(e^2 sum n_i z_i^2)) with sum n_i z_i^2 = 2 N_A c z^2
 * (Gouy-Chapman; Israelachvili 2011; methods.md section 11). Linear screening: meant for dilute salts.
 *
 * @param molPerL             concentration of the salt, mol/L, > 0
 * @param valence             z of both ions, 1..4
 * @param temperature         K, > 0
 * @param staticPermittivity  of the liquid without its ions
 */
export function debyeLength(
	molPerL: number,
	valence: number,
	temperature: number,
	staticPermittivity: number
): number {
	const charges = 2 * AVOGADRO * molPerL * LITRES_PER_M3 * valence ** 2 * ELEMENTARY_CHARGE ** 2;
	return Math.sqrt((VACUUM_PERMITTIVITY * staticPermittivity * BOLTZMANN * temperature) / charges);
}
