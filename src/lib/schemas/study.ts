import { z } from 'zod';
import { LAYERS_MAX, shape, versionRef, zeroFrequencyRule } from './arrangement.ts';
import {
	CHOICE_NAME_MAX,
	CHOICES_MAX,
	MARK_LABEL_MAX,
	MARKS_MAX,
	QUANTITIES,
	ROUGHNESS_RANGE_NM,
	SALT_RANGE_MOL_PER_L,
	SEPARATION_RANGE_NM,
	SHEET_RANGE_SIEMENS,
	TEMPERATURE_RANGE_K,
	THICKNESS_RANGE_NM,
	UNCERTAINTY_RANGE,
	VALENCES
} from './study-limits.ts';

/**
 * A study as an address carries it: one arrangement of pinned versions, up to five model choices that each name only what
 * they change, and where the reader stands (quantity, range, hairline). Results are never part of it: they follow from it.
 */

export const slotMaterial = z.strictObject({
	version: versionRef,
	/** Along the normal of a uniaxial body; `version` is then what lies in the plane. */
	normal: versionRef.optional(),
	/** Of a conducting sheet on the face towards the gap. */
	sheetSiemens: z.number().min(SHEET_RANGE_SIEMENS.min).max(SHEET_RANGE_SIEMENS.max).optional(),
	/** Absent: the limit of the model as written. */
	zeroFrequency: zeroFrequencyRule.optional()
});

export const studyLayer = z.strictObject({
	of: slotMaterial,
	thicknessNm: z.number().min(THICKNESS_RANGE_NM.min).max(THICKNESS_RANGE_NM.max)
});

/** Layers run from the gap outwards, as in the engine's request. */
export const studyBody = z.strictObject({
	layers: z.array(studyLayer).max(LAYERS_MAX),
	substrate: slotMaterial
});

/** `left`, `medium`, `right` are the substrates and the medium; `left1` is the left layer nearest the gap. */
export const slotName = z
	.string()
	.regex(/^(medium|(left|right)([1-9]\d?)?)$/, 'a place is left, left1, medium, right, ...');

/** What a choice changes at one place. `written` takes back a rule that the arrangement sets. */
export const slotChange = z.strictObject({
	version: versionRef.optional(),
	zeroFrequency: z.union([zeroFrequencyRule, z.literal('written')]).optional()
});

export const modelChoice = z.strictObject({
	name: z.string().max(CHOICE_NAME_MAX),
	changes: z.record(slotName, slotChange),
	/** `none` takes the ions out of an arrangement that has them, `off` the static term that they would screen. */
	debyeLengthNm: z.union([z.number().min(0.1).max(1e6), z.literal('none'), z.literal('off')]).optional()
});

export const studySalt = z.strictObject({
	molPerL: z.number().min(SALT_RANGE_MOL_PER_L.min).max(SALT_RANGE_MOL_PER_L.max),
	valence: z.union(VALENCES.map((valence) => z.literal(valence)))
});

const rmsNm = z.number().min(ROUGHNESS_RANGE_NM.min).max(ROUGHNESS_RANGE_NM.max).optional();
export const studyRoughness = z.strictObject({ leftNm: rmsNm, rightNm: rmsNm });

export const quantity = z.enum(QUANTITIES);

const separationNm = z.number().min(SEPARATION_RANGE_NM.min).max(SEPARATION_RANGE_NM.max);

/** A length that the reader wants to see on the ruler: contact distance, roughness, a measured gap. */
export const rulerMark = z.strictObject({ label: z.string().min(1).max(MARK_LABEL_MAX), separationNm });

export const study = z.strictObject({
	left: studyBody,
	medium: slotMaterial,
	right: studyBody,
	shape,
	temperatureK: z.union([z.literal(0), z.number().min(TEMPERATURE_RANGE_K.min).max(TEMPERATURE_RANGE_K.max)]),
	debyeLengthNm: z.number().min(0.1).max(1e6).optional(),
	/** Instead of a Debye length; only one of these three stands at a time. */
	salt: studySalt.optional(),
	/** The static TM term left out, as behind any amount of salt. */
	ions: z.literal('off').optional(),
	/** rms heights; a smooth surface has none. */
	roughness: studyRoughness.optional(),
	/** Standard uncertainty assumed of eps - 1 of every material; absent: what comes with the data. */
	dataUncertainty: z.number().min(UNCERTAINTY_RANGE.min).max(UNCERTAINTY_RANGE.max).optional(),
	choices: z.array(modelChoice).min(1).max(CHOICES_MAX),
	fromNm: separationNm,
	toNm: separationNm,
	quantity,
	/** The red hairline. */
	atNm: separationNm,
	/** The grey, parked one. */
	parkedNm: separationNm.optional(),
	marks: z.array(rulerMark).max(MARKS_MAX),
	/** What the comparison strip holds the curves against: ideal conductors, or the choice with this index. */
	against: z.union([
		z.literal('ideal'),
		z
			.int()
			.min(0)
			.max(CHOICES_MAX - 1)
	])
});

export type SlotMaterial = z.infer<typeof slotMaterial>;
export type StudyLayer = z.infer<typeof studyLayer>;
export type StudyBody = z.infer<typeof studyBody>;
export type SlotChange = z.infer<typeof slotChange>;
export type ModelChoice = z.infer<typeof modelChoice>;
export type Quantity = z.infer<typeof quantity>;
export type StudyMark = z.infer<typeof rulerMark>;
export type Study = z.infer<typeof study>;
export type Side = 'left' | 'right';
