import { permittivityOnImaginaryAxis } from '../permittivity/evaluator.ts';
import { asText, type Check } from './check.ts';

const LOW = 1e10;
const HIGH = 1e19;
const SAMPLES = 271;

/** Rounding of the evaluator may move neighbours on a plateau by this much. */
const SLACK = 4 * Number.EPSILON;

/** eps(i xi) of a passive medium falls with xi and stays at or above 1. xi in rad/s. */
export const monotone: Check = ({ model }) => {
	if (model.kind === 'vacuum' || model.kind === 'constant' || model.kind === 'idealConductor') return null;
	const at = permittivityOnImaginaryAxis(model);
	let before = Number.POSITIVE_INFINITY;
	let rise = 0;
	let where = LOW;
	let lowest = Number.POSITIVE_INFINITY;
	for (let index = 0; index < SAMPLES; index++) {
		const xi = LOW * (HIGH / LOW) ** (index / (SAMPLES - 1));
		const epsilon = at(xi);
		lowest = Math.min(lowest, epsilon);
		const step = (epsilon - before) / epsilon;
		if (step > Math.max(rise, SLACK)) {
			rise = step;
			where = xi;
		}
		before = epsilon;
	}
	if (lowest < 1) {
		return {
			code: 'monotone',
			severity: 'fail',
			message: `eps(i xi) falls to ${asText(lowest)}, below 1, which no passive medium does.`,
			figure: lowest,
			threshold: 1
		};
	}
	return {
		code: 'monotone',
		severity: rise > 0 ? 'fail' : 'info',
		message:
			rise > 0
				? `eps(i xi) rises by a share of ${asText(rise)} near xi = ${asText(where)} rad/s; that of a passive medium only falls.`
				: `eps(i xi) falls all the way from ${asText(LOW)} to ${asText(HIGH)} rad/s and stays above 1.`,
		figure: rise,
		threshold: 0
	};
};
