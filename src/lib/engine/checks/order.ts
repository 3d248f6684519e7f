import { asText, type Check } from './check.ts';

/** Photon energies strictly ascending, so that none stands twice. */
export const order: Check = ({ rows }) => {
	if (!rows) return null;
	const { energiesEv } = rows;
	const wrong = energiesEv.findIndex((energy, index) => index > 0 && !(energy > energiesEv[index - 1]));
	const last = energiesEv.length - 1;
	if (wrong < 0) {
		return {
			code: 'order',
			severity: 'info',
			message: `${energiesEv.length} points from ${asText(energiesEv[0])} to ${asText(energiesEv[last])} eV, in order and none twice.`,
			figure: 0,
			threshold: 0
		};
	}
	return {
		code: 'order',
		severity: 'fail',
		message: `Point ${wrong + 1} at ${asText(energiesEv[wrong])} eV does not lie above the one before it at ${asText(energiesEv[wrong - 1])} eV.`,
		figure: wrong + 1,
		threshold: 0
	};
};
