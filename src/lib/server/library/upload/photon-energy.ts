import {
	evFromRadPerS,
	radPerSFromEv,
	radPerSFromHz,
	radPerSFromPerCm,
	radPerSFromWavelength
} from '../../../engine/units.ts';
import type { AbscissaUnit } from '../../../schemas/upload.ts';

/** hbar*omega in eV of an abscissa; Hz is ordinary frequency, rad/s angular. */
export const PHOTON_ENERGY_EV: Record<AbscissaUnit, (value: number) => number> = {
	eV: (value) => value,
	nm: (value) => evFromRadPerS(radPerSFromWavelength(value * 1e-9)),
	um: (value) => evFromRadPerS(radPerSFromWavelength(value * 1e-6)),
	'cm^-1': (value) => evFromRadPerS(radPerSFromPerCm(value)),
	Hz: (value) => evFromRadPerS(radPerSFromHz(value)),
	'rad/s': evFromRadPerS
};

/** omega in rad/s of an abscissa: given in rad/s it stays as it is, without a detour through eV. */
export const angularFrequency = (value: number, unit: AbscissaUnit): number =>
	unit === 'rad/s' ? value : radPerSFromEv(PHOTON_ENERGY_EV[unit](value));
