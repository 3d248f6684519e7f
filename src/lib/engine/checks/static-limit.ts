import { asText, percent, type Check } from './check.ts';
import { staticPermittivity } from './static-permittivity.ts';

/** Relative distance from the known value that calls for a word. */
export const STATIC_THRESHOLD = 0.05;

/** eps(0) against the known static permittivity of the material. */
export const staticLimit: Check = ({ model, material }) => {
	if (model.kind === 'vacuum' || model.kind === 'idealConductor') return null;
	const result = { code: 'static-limit', threshold: STATIC_THRESHOLD };
	const metal = material.class === 'metal';
	const epsilon = staticPermittivity(model);
	if (epsilon === null) {
		return metal
			? {
					...result,
					severity: 'info',
					message: 'The model conducts, as a metal does: eps(0) is infinite.',
					figure: null
				}
			: {
					...result,
					severity: 'warn',
					message: `The model conducts, so eps(0) is infinite; the material is filed as ${material.class}.`,
					figure: null
				};
	}
	if (metal) {
		return {
			...result,
			severity: 'warn',
			message: `eps(0) is ${asText(epsilon)}, which is finite: the model has no conduction, a metal does.`,
			figure: null
		};
	}
	const known = material.staticPermittivity;
	if (known === null) {
		return {
			...result,
			severity: 'info',
			message: `eps(0) is ${asText(epsilon)}; no known value to compare with.`,
			figure: null
		};
	}
	const distance = epsilon / known - 1;
	return {
		...result,
		severity: Math.abs(distance) > STATIC_THRESHOLD ? 'warn' : 'info',
		message: `eps(0) is ${asText(epsilon)}; the known value is ${asText(known)}, a difference of ${percent(distance)}.`,
		figure: distance
	};
};
