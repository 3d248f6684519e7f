import type { ForcePoint } from '../engine/contract.ts';
import { choiceLetter } from '../schemas/study-slots.ts';
import type { Quantity, Study } from '../schemas/study.ts';
import { differenceFrom, ratioToIdeal } from './comparison.ts';
import { seriesOf, sharesOf, type Series } from './series.ts';
import { bandOf, deviationsOf } from './bands.ts';
import { signRuns } from './sign-runs.ts';
import { inkOf, type DrawnChoice } from './strip.ts';

/** From what the engine answered to what the strips draw. */

export interface Answered {
	name: string;
	points: readonly (ForcePoint | undefined)[];
	previous: readonly (ForcePoint | undefined)[];
	/** Points that say how uncertain the data make them; empty where nobody asked. */
	uncertain?: readonly (ForcePoint | undefined)[];
}

/** The sign whose line is solid becomes the negative one: the strips know attraction only as "below zero". */
const oriented = (series: Series, solid: -1 | 1): Series =>
	solid === -1 ? series : { ...series, values: series.values.map((value) => -value) };

/** Forces of cylinders beside plates and each other are integrals over the gap, a unit of length. */
export const isPerLength = ({ kind }: Study['shape']): boolean =>
	kind === 'cylinderPlate' || kind === 'parallelCylinders';

export function drawnChoices(
	answered: readonly Answered[],
	quantity: Quantity,
	solid: -1 | 1,
	against: Study['against'],
	shape: Study['shape']
): DrawnChoice[] {
	const all = answered.map(({ points }) => seriesOf(points, quantity));
	return answered.map(({ name, points, previous, uncertain = [] }, index) => {
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
			band: bandOf(drawn, deviationsOf(uncertain, quantity, isPerLength(shape))),
			ratio: oriented(ratioToIdeal(series, quantity, shape), 1)
		};
	});
}
