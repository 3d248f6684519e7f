import { matsubaraFrequency } from '../lifshitz/matsubara.ts';
import { epsilonSharesOf } from '../permittivity/table.ts';
import { asText, percent, type Check } from './check.ts';

/** Share of eps - 1 from outside the data above which a submitter must say why that is right. */
export const RELIANCE_THRESHOLD = 0.5;
const TEMPERATURE = 300;
const TERMS = 40;

/**
 * How much of eps(i xi) - 1 comes from the ends of a table and not from its data, at the Matsubara frequencies of 300 K
 * from the first to the fortieth (which a gap of 15 nm still feels).
 */
export const reliance: Check = ({ model }) => {
	if (model.kind !== 'table') return null;
	let worst = { n: 1, outside: -1, below: 0, above: 0 };
	let sum = 0;
	const sharesAt = epsilonSharesOf(model);
	for (let n = 1; n <= TERMS; n++) {
		const { below, above } = sharesAt(matsubaraFrequency(n, TEMPERATURE));
		sum += below + above;
		if (below + above > worst.outside) worst = { n, outside: below + above, below, above };
	}
	return {
		code: 'reliance',
		severity: worst.outside > RELIANCE_THRESHOLD ? 'warn' : 'info',
		message:
			`Up to ${percent(worst.outside)} of eps(i xi) - 1 rests on extrapolation (${percent(worst.below)} from below the table, ` +
			`${percent(worst.above)} from above, at the Matsubara frequency ${worst.n} of ${TEMPERATURE} K); ` +
			`over the first ${TERMS} the mean is ${asText((sum / TERMS) * 100)} %.`,
		figure: worst.outside,
		threshold: RELIANCE_THRESHOLD
	};
};
