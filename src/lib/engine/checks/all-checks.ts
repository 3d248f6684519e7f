import { agreement } from './agreement.ts';
import type { Check, CheckOutcome, CheckSubject } from './check.ts';
import { fSumRule } from './f-sum-rule.ts';
import { highFrequencyLimit } from './high-frequency-limit.ts';
import { joints } from './joints.ts';
import { kramersKronigResidual } from './kramers-kronig-residual.ts';
import { monotone } from './monotone.ts';
import { order } from './order.ts';
import { passivity } from './passivity.ts';
import { reliance } from './reliance.ts';
import { spacing } from './spacing.ts';
import { staticLimit } from './static-limit.ts';
import { unitSlip } from './unit-slip.ts';

/** In the order in which a page lists them; each says its own severity. */
export const ALL_CHECKS: readonly Check[] = [
	order,
	unitSlip,
	spacing,
	passivity,
	monotone,
	staticLimit,
	highFrequencyLimit,
	kramersKronigResidual,
	fSumRule,
	joints,
	reliance,
	agreement
];

/** Later checks assume an ordered passive table, so a `fail` of these ends the list. */
const FOUNDATIONS: readonly Check[] = [order, passivity];

/** Runs every check that applies. Pure: the same subject, the same sentences. */
export function runChecks(subject: CheckSubject): CheckOutcome[] {
	const broken = FOUNDATIONS.map((check) => check(subject)).filter((outcome) => outcome?.severity === 'fail');
	const checks = broken.length > 0 && subject.rows ? FOUNDATIONS : ALL_CHECKS;
	return checks.map((check) => check(subject)).filter((outcome) => outcome !== null);
}
