import { permittivityOnImaginaryAxis } from '../permittivity/evaluator.ts';
import { asText, type Check } from './check.ts';

/** What may be left of eps - 1 at HIGH_XI; free electrons of any solid leave less than 1e-5 there. */
export const LIMIT_THRESHOLD = 1e-3;
const HIGH_XI = 1e20;

/** eps(i xi) goes to 1: a constant left over counts as response at every frequency, and the energy sum feels it. */
export const highFrequencyLimit: Check = ({ model }) => {
	if (model.kind === 'vacuum' || model.kind === 'idealConductor') return null;
	const left = permittivityOnImaginaryAxis(model)(HIGH_XI) - 1;
	const kept = Math.abs(left) > LIMIT_THRESHOLD;
	return {
		code: 'high-frequency-limit',
		severity: kept ? 'warn' : 'info',
		message: kept
			? `eps(i xi) is still ${asText(left + 1)} at ${asText(HIGH_XI)} rad/s; give the part that remains a frequency of its own.`
			: `eps(i xi) - 1 has fallen to ${asText(left)} at ${asText(HIGH_XI)} rad/s.`,
		figure: left,
		threshold: LIMIT_THRESHOLD
	};
};
