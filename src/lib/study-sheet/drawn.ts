import type { ForcePoint } from '../engine/contract.ts';
import { choiceLetter } from '../schemas/study-slots.ts';
import type { Quantity, Study } from '../schemas/study.ts';
import { differenceFrom, ratioToIdeal } from './comparison.ts';
import { seriesOf, sharesOf, type Series } from './series.ts';
import { signRuns } from './sign-runs.ts';
import { inkOf, type DrawnChoice } from './strip.ts';

/** From what the engine answered to what the strips draw. */

export interface Answered {
	name: string;
	points: readonly (ForcePoint | undefined)[];
	previous: readonly (ForcePoint | undefined)[];
}

/** The sign whose line is solid becomes the negative one: the strips know attraction only as "below zero". */
const oriented = (series: Series, solid: -1 | 1): Series =>
	solid === -1 ? series : { ...series, values: series.values.map((value) => -value) };

export function drawnChoices(
	answered: readonly Answered[],
	quantity: Quantity,
	solid: -1 | 1,
	against: Study['against'],
	shape: Study['shape']
): DrawnChoice[] {
	const all = answered.map(({ points }) => seriesOf(points, quantity));
	return answered.map(({ name, points, previous }, index) => {
		const series = all[index];
		const drawn = oriented(series, solid);
		const reference = against === 'ideal' ? undefined : all[against];
		return {
			letter: choiceLetter(index),
			name,
			ink: inkOf(index),
			series: drawn,
			previous: previous.length > 0 ? oriented(seriesOf(previous, quantity), solid) : null,
			runs: signRuns(drawn),
			shares: sharesOf(points, quantity),
			difference: reference ? differenceFrom(series, reference) : null,
			ratio: oriented(ratioToIdeal(series, quantity, shape), 1)
		};
	});
}
