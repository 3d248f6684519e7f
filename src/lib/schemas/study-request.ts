import type { ForceRequestInput, PinnedMaterial } from './force.ts';
import { materialIn } from './study-slots.ts';
import type { ModelChoice, Study, StudyBody } from './study.ts';

/** What the engine is asked for one model choice of a study. */

const PER_DECADE = 57;
const POINTS_MAX = 400;

/** Separations of a curve: evenly on the logarithmic axis, dense enough that straight pieces look like the curve. */
export function curveSeparations(study: Study): { from: number; to: number; count: number; spacing: 'log' } {
	const decades = Math.log10(study.toNm / study.fromNm);
	const count = Math.min(POINTS_MAX, Math.max(21, Math.round(decades * PER_DECADE) + 1));
	return { from: study.fromNm, to: study.toNm, count, spacing: 'log' };
}

export function choiceRequest(
	study: Study,
	choice: ModelChoice,
	separationsNm: ForceRequestInput['separationsNm'] = curveSeparations(study)
): ForceRequestInput {
	const material = (slot: string): PinnedMaterial => materialIn(study, choice, slot) as PinnedMaterial;
	const body = (side: 'left' | 'right', { layers }: StudyBody) => ({
		layers: layers.map(({ thicknessNm }, index) => ({ of: material(`${side}${index + 1}`), thicknessNm })),
		substrate: material(side)
	});
	const debyeLengthNm = choice.debyeLengthNm ?? study.debyeLengthNm;
	return {
		arrangement: {
			left: body('left', study.left),
			medium: material('medium'),
			right: body('right', study.right),
			shape: study.shape,
			temperatureK: study.temperatureK,
			...(debyeLengthNm === undefined || debyeLengthNm === 'none' ? {} : { debyeLengthNm })
		},
		separationsNm,
		include: ['breakdown']
	};
}
