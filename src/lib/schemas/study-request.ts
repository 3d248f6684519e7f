import type { Roughness } from '../engine/contract.ts';
import { closestSeparationNm } from '../engine/shapes/roughness.ts';
import type { ForceRequestInput, PinnedMaterial } from './force.ts';
import { materialIn } from './study-slots.ts';
import type { ModelChoice, SlotMaterial, Study, StudyBody } from './study.ts';

/** What the engine is asked for one model choice of a study. */

const PER_DECADE = 57;
const POINTS_MAX = 400;

const rms = (rmsNm: number | undefined) =>
	rmsNm === undefined ? undefined : ({ kind: 'rms', rmsNm } as const);

/** Roughness as the engine takes it. */
function roughnessOf({ roughness }: Study): Roughness | undefined {
	const [left, right] = [rms(roughness?.leftNm), rms(roughness?.rightNm)];
	if (!left && !right) return undefined;
	return { ...(left ? { left } : {}), ...(right ? { right } : {}) };
}

/** Below this rough surfaces come too near to be averaged over; nothing is asked for there. */
export function closestNm(study: Study): number {
	const roughness = roughnessOf(study);
	return roughness ? closestSeparationNm(roughness) * (1 + 1e-12) : 0;
}

/** Separations of a curve: evenly on the logarithmic axis, dense enough that straight pieces look like the curve. */
export function curveSeparations(study: Study): { from: number; to: number; count: number; spacing: 'log' } {
	const nearest = closestNm(study);
	// A range that lies below as a whole is asked for as it stands, so that the refusal says what is wrong with it.
	const from = nearest < study.toNm / 1.5 ? Math.max(study.fromNm, nearest) : study.fromNm;
	const decades = Math.log10(study.toNm / from);
	const count = Math.min(POINTS_MAX, Math.max(21, Math.round(decades * PER_DECADE) + 1));
	return { from, to: study.toNm, count, spacing: 'log' };
}

/** Enough for a band that is smooth in both logarithms. */
const BAND_POINTS = 21;

export const bandSeparations = (study: Study): ReturnType<typeof curveSeparations> => ({
	...curveSeparations(study),
	count: BAND_POINTS
});

/** Ions of a choice: its own statement, or that of the arrangement. */
function ionsOf(
	study: Study,
	{ debyeLengthNm: own }: ModelChoice
): Partial<ForceRequestInput['arrangement']> {
	if (own === 'none') return {};
	if (own === 'off') return { ions: 'off' };
	if (own !== undefined) return { debyeLengthNm: own };
	const { debyeLengthNm, salt, ions } = study;
	return {
		...(debyeLengthNm === undefined ? {} : { debyeLengthNm }),
		...(salt ? { salt } : {}),
		...(ions ? { ions } : {})
	};
}

export function choiceRequest(
	study: Study,
	choice: ModelChoice,
	separationsNm: ForceRequestInput['separationsNm'] = curveSeparations(study),
	include: ForceRequestInput['include'] = ['breakdown']
): ForceRequestInput {
	const assumed = include.includes('uncertainty') ? study.dataUncertainty : undefined;
	const material = (slot: string): PinnedMaterial => {
		const { normal, sheetSiemens, ...plain } = materialIn(study, choice, slot) as SlotMaterial;
		return {
			...plain,
			...(normal === undefined ? {} : { normal: { version: normal } }),
			...(sheetSiemens === undefined ? {} : { sheet: { kind: 'constant', siemens: sheetSiemens } }),
			...(assumed === undefined ? {} : { uncertainty: { kind: 'scale', relative: assumed } })
		};
	};
	const body = (side: 'left' | 'right', { layers }: StudyBody) => ({
		layers: layers.map(({ thicknessNm }, index) => ({ of: material(`${side}${index + 1}`), thicknessNm })),
		substrate: material(side)
	});
	const roughness = roughnessOf(study);
	return {
		arrangement: {
			left: body('left', study.left),
			medium: material('medium'),
			right: body('right', study.right),
			shape: study.shape,
			temperatureK: study.temperatureK,
			...ionsOf(study, choice),
			...(roughness ? { roughness } : {})
		},
		separationsNm,
		include
	};
}

/** The long answers at one separation. */
export const DETAILS: ForceRequestInput['include'] = ['analysis', 'terms', 'sensitivity', 'uncertainty'];
