/**
 * Constants of nature. The first block is exact in the SI since 2019 (CODATA 2018 and 2022 agree); the vacuum
 * permittivity is measured and stands with its release.
 */
export const CONSTANTS_RELEASE = 'CODATA 2022';

/** J s, exact. */
export const PLANCK = 6.62607015e-34;
/** J s, exact up to rounding. */
export const REDUCED_PLANCK = PLANCK / (2 * Math.PI);
/** J/K, exact. */
export const BOLTZMANN = 1.380649e-23;
/** m/s, exact. */
export const SPEED_OF_LIGHT = 299792458;
/** C, exact. */
export const ELEMENTARY_CHARGE = 1.602176634e-19;
/** 1/mol, exact. */
export const AVOGADRO = 6.02214076e23;
/** F/m, CODATA 2022: 8.8541878188(14)e-12. Enters dc conductivities and electrostatics only. */
export const VACUUM_PERMITTIVITY = 8.8541878188e-12;
/** Riemann zeta(3). */
export const ZETA_3 = 1.2020569031595942;
