import { asText, percent, type Check } from './check.ts';

/** Step of eps'' at the joint, as a ratio to the table's own value, that calls for a word. */
export const JOINT_THRESHOLD = 0.2;

/** eps'' of the Drude low end against the first point of the table. The other ends join by definition. */
export const joints: Check = ({ model }) => {
	if (model.kind !== 'table' || model.lowEnd.kind !== 'drude') return null;
	const { plasmaEnergyEv, dampingEv } = model.lowEnd;
	const [energy] = model.energiesEv;
	const [measured] = model.epsilon2;
	const joined = (plasmaEnergyEv ** 2 * dampingEv) / (energy * (energy ** 2 + dampingEv ** 2));
	if (!(measured > 0)) return null;
	const step = joined / measured - 1;
	return {
		code: 'joints',
		severity: Math.abs(step) > JOINT_THRESHOLD ? 'warn' : 'info',
		message: `At ${asText(energy)} eV the Drude low end gives eps'' = ${asText(joined)} and the table ${asText(measured)}, a step of ${percent(step)}.`,
		figure: step,
		threshold: JOINT_THRESHOLD
	};
};
