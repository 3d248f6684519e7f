import { permittivityOnRealAxis } from '../permittivity/evaluator.ts';
import { radPerSFromEv } from '../units.ts';
import { asText, type Check } from './check.ts';

const LOW_EV = 1e-5;
const HIGH_EV = 1e5;
const SAMPLES = 800;

/**
 * eps'' >= 0 at every real frequency: at the points of a table, and for closed forms on a logarithmic grid. Undamped
 * oscillators and tables on the imaginary axis have nothing to sample there; `monotone` watches those.
 */
export const passivity: Check = ({ model, rows }) => {
	const points = rows ? rowsOf(rows) : sampled(model);
	if (points.length === 0) return null;
	const worst = points.reduce((lowest, point) => (point.epsilon2 < lowest.epsilon2 ? point : lowest));
	const passive = worst.epsilon2 >= 0;
	return {
		code: 'passivity',
		severity: passive ? 'info' : 'fail',
		message: passive
			? `eps'' is nowhere below zero; its lowest value is ${asText(worst.epsilon2)} at ${asText(worst.energyEv)} eV.`
			: `eps'' is ${asText(worst.epsilon2)} at ${asText(worst.energyEv)} eV: the medium would give energy away.`,
		figure: worst.epsilon2,
		threshold: 0
	};
};

const rowsOf = ({ energiesEv, epsilon2 }: { energiesEv: number[]; epsilon2: number[] }) =>
	energiesEv.map((energyEv, index) => ({ energyEv, epsilon2: epsilon2[index] }));

function sampled(model: Parameters<typeof permittivityOnRealAxis>[0]) {
	if (model.kind === 'imaginaryTable' || model.kind === 'idealConductor') return [];
	const at = permittivityOnRealAxis(model);
	return Array.from({ length: SAMPLES }, (_, index) => {
		const energyEv = LOW_EV * (HIGH_EV / LOW_EV) ** (index / (SAMPLES - 1));
		return { energyEv, epsilon2: at(radPerSFromEv(energyEv)).epsIm };
	}).filter(({ epsilon2 }) => Number.isFinite(epsilon2));
}
