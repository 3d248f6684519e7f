import { asText, type Check } from './check.ts';

/** Step in ln(omega) above which the interpolation and not the measurement says what eps'' is in between. */
export const SPACING_THRESHOLD = 0.1;

/** Gaps between neighbouring points, as steps of ln(omega). */
export const spacing: Check = ({ rows }) => {
	if (!rows || rows.energiesEv.length < 2) return null;
	const { energiesEv } = rows;
	const steps = energiesEv.slice(1).map((energy, index) => Math.log(energy / energiesEv[index]));
	const wide = steps.filter((step) => step > SPACING_THRESHOLD).length;
	const largest = Math.max(...steps);
	const at = steps.indexOf(largest);
	const where = `from ${asText(energiesEv[at])} to ${asText(energiesEv[at + 1])} eV`;
	return {
		code: 'spacing',
		severity: wide > 0 ? 'warn' : 'info',
		message:
			wide > 0
				? `${wide} of ${steps.length} steps in ln(omega) exceed ${SPACING_THRESHOLD}; the widest is ${asText(largest)}, ${where}.`
				: `The widest step in ln(omega) is ${asText(largest)}, ${where}.`,
		figure: largest,
		threshold: SPACING_THRESHOLD
	};
};
