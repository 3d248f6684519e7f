import { z } from 'zod';
import { versionRef } from './arrangement.ts';
import { materialClass } from './material.ts';
import { line } from './plain-text.ts';
import { visibility } from './saved-study.ts';
import { SEPARATION_RANGE_NM, TEMPERATURE_RANGE_K, THICKNESS_RANGE_NM } from './study-limits.ts';

/** What a screening is asked, and what becomes of it. */

export const SCREENING_LIMITS = {
	/** Arrangements times separations. */
	evaluations: 10_000_000,
	separations: 20,
	temperatures: 20,
	bodies: 2000
} as const;

/** Of the pressures that are compared. */
export const SCREENING_ACCURACY = 1e-6;

export const HAZARD_RANKS = ['none', 'warning', 'danger'] as const;

const thicknessNm = z.number().min(THICKNESS_RANGE_NM.min).max(THICKNESS_RANGE_NM.max);

export const sweep = z
	.strictObject({ from: thicknessNm, to: thicknessNm, count: z.int().min(2).max(40) })
	.refine(({ from, to }) => to > from, { error: 'the upper end lies above the lower one', path: ['to'] });

/** Any part; nothing at all is everything published. */
export const screeningSide = z.strictObject({
	class: z.union([materialClass, z.literal('solid')]).optional(),
	search: z.string().trim().max(200).optional(),
	versions: z.array(versionRef).max(500).optional(),
	/** The worst signal word that is still wanted. */
	hazard: z.enum(HAZARD_RANKS).optional(),
	/** Tables must have been measured at least up to here; closed forms pass. */
	measuredToEv: z.number().positive().max(1e6).optional(),
	coating: z
		.strictObject({ of: versionRef, thicknessNm: z.union([thicknessNm, sweep]) })
		.optional()
		.meta({ description: 'a film on every body of this side, of one thickness or of several' })
});

const separationNm = z.number().min(SEPARATION_RANGE_NM.min).max(SEPARATION_RANGE_NM.max);
const within = { fromNm: separationNm.optional(), toNm: separationNm.optional() };

export const CRITERIA = [
	'repulsive',
	'below',
	'stableEquilibrium',
	'stiffestTrap',
	'leastAdhesion',
	'leastSpread',
	'mostPerCoating'
] as const;

export const criterion = z.discriminatedUnion('kind', [
	z.strictObject({ kind: z.literal('repulsive'), ...within }),
	z.strictObject({ kind: z.literal('below'), pressurePa: z.number().positive(), ...within }),
	z.strictObject({ kind: z.literal('stableEquilibrium'), ...within }),
	z.strictObject({ kind: z.literal('stiffestTrap'), ...within }),
	z.strictObject({ kind: z.literal('leastAdhesion'), ...within }),
	z.strictObject({ kind: z.literal('leastSpread'), ...within }),
	z.strictObject({ kind: z.literal('mostPerCoating'), ...within })
]);

const temperature = z
	.number()
	.refine(
		(value) => value === 0 || (value >= TEMPERATURE_RANGE_K.min && value <= TEMPERATURE_RANGE_K.max),
		`0, or between ${TEMPERATURE_RANGE_K.min} and ${TEMPERATURE_RANGE_K.max} K`
	);

export const screeningRule = z.enum(['written', 'drude', 'plasma']);

export const screeningStatement = z.strictObject({
	left: screeningSide,
	medium: screeningSide,
	/** Absent: the same bodies as on the left, each pair once. */
	right: screeningSide.optional(),
	separationsNm: z
		.array(separationNm)
		.min(1)
		.max(SCREENING_LIMITS.separations)
		.transform((all) => [...new Set(all)].sort((a, b) => a - b)),
	temperatureK: z
		.union([temperature, z.array(temperature).min(1).max(SCREENING_LIMITS.temperatures)])
		.default(300),
	/** How the static term of conductors is taken; several stand against each other. */
	rules: z.array(screeningRule).min(1).max(3).default(['written']),
	/** One version a material, or every published one. */
	rivals: z.enum(['recommended', 'all']).default('recommended'),
	criterion
});

export const newScreening = z.strictObject({
	name: line(200),
	statement: screeningStatement,
	visibility: visibility.default('private'),
	group: z.string().max(80).nullable().default(null)
});

export type ScreeningStatement = z.infer<typeof screeningStatement>;
export type ScreeningSide = z.infer<typeof screeningSide>;
export type Criterion = z.infer<typeof criterion>;
export type ScreeningRule = z.infer<typeof screeningRule>;
export type NewScreening = z.infer<typeof newScreening>;

/** One material of the plan under its version. */
export interface PlanMaterial {
	ref: string;
	checksum: string;
	slug: string;
	name: string;
	class: z.infer<typeof materialClass>;
	hazard: (typeof HAZARD_RANKS)[number];
	conducts: boolean;
	quality: 'checked' | 'provisional';
}

/** A body or a medium: places in the list of materials. */
export interface PlanPart {
	/** Bodies of one group differ in nothing but the data they are computed with. */
	group: number;
	of: number;
	coating?: { of: number; thicknessNm: number };
	/** The data that the result is stated for; the others say how far it can be trusted. */
	reference: boolean;
}

export interface ScreeningPlan {
	materials: PlanMaterial[];
	left: PlanPart[];
	media: PlanPart[];
	right: PlanPart[];
	/** Left and right are one list, and each pair is computed once. */
	symmetric: boolean;
	temperaturesK: number[];
	rules: ScreeningRule[];
	separationsNm: number[];
	relativeAccuracy: number;
}

export const SCREENING_STATE_NAMES = [
	'queued',
	'running',
	'paused',
	'finished',
	'cancelled',
	'failed'
] as const;

export const screeningSummary = z
	.object({
		id: z.uuid(),
		name: z.string(),
		owner: z.string(),
		group: z.object({ slug: z.string(), name: z.string() }).nullable(),
		visibility,
		state: z.enum(SCREENING_STATE_NAMES),
		cells: z.int().meta({ description: 'arrangements; each is computed at every separation' }),
		cellsDone: z.int(),
		separations: z.int(),
		estimatedSeconds: z.number().meta({ description: 'of one core' }),
		/** At the pace of the last chunks; null before there is one, and after the end. */
		secondsLeft: z.number().nullable(),
		createdAt: z.iso.datetime(),
		finishedAt: z.iso.datetime().nullable(),
		checksum: z.string().nullable(),
		failure: z.string().nullable()
	})
	.meta({ id: 'Screening' });

export type ScreeningSummary = z.infer<typeof screeningSummary>;

/** One line of the result: bodies and medium, whatever data they were computed with. */
export const screeningRow = z
	.object({
		rank: z.int(),
		left: z.string(),
		medium: z.string(),
		right: z.string(),
		temperatureK: z.number(),
		mediumHazard: z.enum(HAZARD_RANKS),
		qualifies: z.boolean(),
		/** In the unit of the criterion; null where it cannot be said. */
		figure: z.number().nullable(),
		/** Least and most over all data combinations. */
		low: z.number().nullable(),
		high: z.number().nullable(),
		combinations: z.int(),
		/** At the asked separation: pressure, its bound, and the share of combinations with the same sign. */
		pressurePa: z.number().nullable(),
		errorBound: z.number().nullable(),
		signCertainty: z.number().nullable(),
		/** Opens it as a study. */
		query: z.string(),
		versions: z.array(z.string())
	})
	.meta({ id: 'ScreeningRow' });
export type ScreeningRow = z.infer<typeof screeningRow>;

export const rowsQuery = z.object({
	at: z.coerce.number().int().min(0).default(0),
	from: z.coerce.number().int().min(0).default(0),
	count: z.coerce.number().int().min(1).max(500).default(100)
});
