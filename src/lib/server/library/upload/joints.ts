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

/**
 * Where two tables meet: eps'' of the second against the first, drawn on along its last two points.
 *
 * @param count  rows of the one that lies lower in energy
 */
export function tableJoint(model: PermittivityModel, count: number): JointMismatch[] {
	if (model.kind !== 'table' || count < 2 || count >= model.energiesEv.length) return [];
	const { energiesEv, epsilon2 } = model;
	const [a, b, c] = [count - 2, count - 1, count];
	if (!(epsilon2[a] > 0 && epsilon2[b] > 0 && epsilon2[c] > 0)) return [];
	const slope = Math.log(epsilon2[b] / epsilon2[a]) / Math.log(energiesEv[b] / energiesEv[a]);
	const expected = epsilon2[b] * (energiesEv[c] / energiesEv[b]) ** slope;
	return [{ end: 'joined', energyEv: energiesEv[c], percent: 100 * (epsilon2[c] / expected - 1) }];
}

/** eps'' of a Drude conductor at hbar*omega in eV: wp^2 gamma / (omega (omega^2 + gamma^2)). */
export const drudeEpsilon2 = (energyEv: number, plasmaEnergyEv: number, dampingEv: number): number =>
	(plasmaEnergyEv ** 2 * dampingEv) / (energyEv * (energyEv ** 2 + dampingEv ** 2));
