import { permittivityOnRealAxis } from '../permittivity/evaluator.ts';
import { radPerSFromEv } from '../units.ts';
import { percent, type Check } from './check.ts';

/** Root mean square of the relative residual that calls for a word. */
export const RESIDUAL_THRESHOLD = 0.1;

/** Each point costs an integral over the whole table, so a long table is sampled evenly. */
const POINTS_MAX = 120;

const BANDS = ['lower', 'middle', 'upper'] as const;

/**
 * eps' as tabulated against eps' from eps'' by Kramers-Kronig, ends of the table included (methods.md, section 7, check
 * 2). Residuals are relative to |eps' - 1| + eps'' so that a zero of eps' does not make one large; the first and last
 * point are left out, where the principal value has the kink of the joint.
 */
export const kramersKronigResidual: Check = ({ model, rows }) => {
	if (model.kind !== 'table' || !rows?.epsilon1 || rows.energiesEv.length < 6) return null;
	const at = permittivityOnRealAxis(model);
	const { energiesEv, epsilon1, epsilon2 } = rows;
	const residuals = innerIndices(energiesEv.length).map((index) => {
		const given = epsilon1[index];
		return (at(radPerSFromEv(energiesEv[index])).epsRe - given) / (Math.abs(given - 1) + epsilon2[index]);
	});
	const bands = BANDS.map((name, band) => {
		const from = Math.floor((residuals.length * band) / BANDS.length);
		const to = Math.floor((residuals.length * (band + 1)) / BANDS.length);
		return `${percent(rms(residuals.slice(from, to)))} in the ${name} third`;
	});
	const total = rms(residuals);
	return {
		code: 'kramers-kronig-residual',
		severity: total > RESIDUAL_THRESHOLD ? 'warn' : 'info',
		message: `eps' differs from the Kramers-Kronig transform of eps'' by ${percent(total)} in the root mean square: ${bands.join(', ')} of the points.`,
		figure: total,
		threshold: RESIDUAL_THRESHOLD
	};
};

/** All but the first and last, or as many of them as are taken. */
function innerIndices(length: number): number[] {
	const count = Math.min(length - 2, POINTS_MAX);
	const step = (length - 3) / Math.max(count - 1, 1);
	return Array.from({ length: count }, (_, index) => 1 + Math.round(index * step));
}

const rms = (values: number[]): number =>
	Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);
