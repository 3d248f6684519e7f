import type { PermittivityModel } from '../../../engine/contract.ts';
import type { JointMismatch } from '../../../schemas/upload-preview.ts';

/**
 * A power is joined where it meets the table and cannot miss it; a Drude end brings its own height. Null rows and closed forms
 * have no joint.
 */
export function jointMismatches(model: PermittivityModel): JointMismatch[] {
	if (model.kind !== 'table' || model.lowEnd.kind !== 'drude') return [];
	const [energyEv] = model.energiesEv;
	const [measured] = model.epsilon2;
	if (!(measured > 0)) return [];
	const { plasmaEnergyEv, dampingEv } = model.lowEnd;
	const drude = drudeEpsilon2(energyEv, plasmaEnergyEv, dampingEv);
	return [{ end: 'low', energyEv, percent: 100 * (drude / measured - 1) }];
}

/** eps'' of a Drude conductor at hbar*omega in eV: wp^2 gamma / (omega (omega^2 + gamma^2)). */
export const drudeEpsilon2 = (energyEv: number, plasmaEnergyEv: number, dampingEv: number): number =>
	(plasmaEnergyEv ** 2 * dampingEv) / (energyEv * (energyEv ** 2 + dampingEv ** 2));
