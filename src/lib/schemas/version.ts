import { z } from 'zod';
import { uncertainty } from './force.ts';
import { permittivityModel } from './permittivity.ts';
import { hazards, materialClass } from './material.ts';
import { line } from './plain-text.ts';
import { source } from './source.ts';

/** A numbered, immutable state of a dataset, as it leaves the services. */

export const versionState = z.enum(['draft', 'in_review', 'published', 'withdrawn']);
export const quality = z.enum(['checked', 'provisional']);
export const versionKind = z.enum(['table', 'model']);
export const checkSeverity = z.enum(['fail', 'warn', 'info']);

/** Energies as hbar*omega in eV; `null` where there is nothing to state. */
export const energyRangeEv = z.object({ low: z.number(), high: z.number() }).meta({ id: 'EnergyRangeEv' });

export const versionNumber = z
	.string()
	.regex(/^(0|[1-9]\d{0,5})\.(0|[1-9]\d{0,5})$/, 'a version number reads major.minor, as 1.0');

export const checkResult = z
	.object({
		code: z.string(),
		severity: checkSeverity,
		/** A sentence that carries its figure. */
		message: z.string(),
		figure: z.number().nullable(),
		threshold: z.number().nullable(),
		/** Why the submitter let a warning stand. */
		answer: z.string().nullable()
	})
	.meta({ id: 'CheckResult' });

export const sample = z
	.object({
		form: line(60).nullable().default(null),
		preparation: line(500).nullable().default(null),
		thicknessNm: z.number().positive().nullable().default(null),
		substrate: line(200).nullable().default(null),
		annealing: line(200).nullable().default(null),
		roughnessNm: z.number().nonnegative().nullable().default(null),
		method: line(300).nullable().default(null),
		temperatureK: z.number().positive().nullable().default(null),
		compiled: z.boolean().nullable().default(null)
	})
	.meta({ id: 'Sample' });

export const versionSummary = z
	.object({
		/** slug@major.minor */
		ref: z.string(),
		number: versionNumber,
		state: versionState,
		quality,
		qualityReason: z.string().nullable(),
		kind: versionKind,
		/** Kind of the model at its top: table, drude, sum ... */
		modelKind: z.string(),
		/** Where measured numbers stand behind it. */
		measuredRangeEv: energyRangeEv.nullable(),
		/** Where the source allows its use. */
		validRangeEv: energyRangeEv.nullable(),
		/** eps(0); null for conductors. */
		staticPermittivity: z.number().nullable(),
		conducts: z.boolean(),
		checksum: z.string(),
		fingerprint: z.string(),
		note: z.string().nullable(),
		publishedAt: z.iso.datetime().nullable(),
		publishedBy: z.string().nullable(),
		/** Number of the version that supersedes it, if one is published. */
		supersededBy: z.string().nullable(),
		sources: z.array(source)
	})
	.meta({ id: 'VersionSummary' });

export const versionDetail = versionSummary
	.extend({
		dataset: z.object({ slug: z.string(), title: z.string() }),
		material: z.object({
			slug: z.string(),
			name: z.string(),
			formula: z.string().nullable(),
			class: materialClass,
			hazards: hazards.nullable()
		}),
		model: permittivityModel,
		checks: z.array(checkResult),
		sample: sample.nullable(),
		parent: z.string().nullable(),
		successors: z.array(z.string()),
		createdAt: z.iso.datetime(),
		withdrawn: z.object({ at: z.iso.datetime(), by: z.string(), reason: z.string() }).nullable(),
		/** Rows as given, where the version came from a table. */
		table: z
			.object({
				abscissaUnit: z.string(),
				quantities: z.array(z.string()),
				rowCount: z.int(),
				/** A second table that was joined to the file, as it was typed. */
				joined: z.string().optional(),
				/** Bytes as uploaded. */
				raw: z.object({ name: z.string(), sha256: z.string(), bytes: z.int() }).nullable()
			})
			.nullable()
	})
	.meta({ id: 'Version' });

/** What a computation needs of a pinned version, and what its title block says about it. */
export const resolvedVersion = z.object({
	ref: z.string(),
	model: permittivityModel,
	/** What came with its table; null where nothing did. */
	uncertainty: uncertainty.nullish(),
	checksum: z.string(),
	quality,
	qualityReason: z.string().nullable(),
	state: versionState,
	supersededBy: z.string().nullable(),
	datasetTitle: z.string(),
	conducts: z.boolean(),
	material: z.object({
		slug: z.string(),
		name: z.string(),
		formula: z.string().nullable(),
		class: materialClass,
		hazards: hazards.nullable()
	}),
	measuredRangeEv: energyRangeEv.nullable(),
	sources: z.array(source)
});

/** Sampled on the server for plots; every array of one group has the same length. */
export const spectrum = z.object({
	ref: z.string(),
	measuredRangeEv: energyRangeEv.nullable(),
	/** Imaginary axis: xi in rad/s ascending. Shares of eps - 1 are given for tables only. */
	imaginary: z.object({
		xiRadPerS: z.array(z.number()),
		epsilon: z.array(z.number()),
		shares: z
			.object({ below: z.array(z.number()), inside: z.array(z.number()), above: z.array(z.number()) })
			.nullable()
	}),
	/** Real axis: hbar*omega in eV ascending; null for models without one (ideal conductor, table of eps(i xi)). */
	real: z
		.object({
			energyEv: z.array(z.number()),
			epsilon1: z.array(z.number()),
			epsilon2: z.array(z.number()),
			n: z.array(z.number()),
			k: z.array(z.number())
		})
		.nullable(),
	/** The measured points themselves, where the version came from a table. */
	points: z
		.object({
			energyEv: z.array(z.number()),
			epsilon1: z.array(z.number()).nullable(),
			epsilon2: z.array(z.number()),
			n: z.array(z.number()).nullable(),
			k: z.array(z.number()).nullable()
		})
		.nullable()
});

export type VersionState = z.infer<typeof versionState>;
export type Quality = z.infer<typeof quality>;
export type VersionKind = z.infer<typeof versionKind>;
export type EnergyRangeEv = z.infer<typeof energyRangeEv>;
export type CheckSeverity = z.infer<typeof checkSeverity>;
export type CheckResult = z.infer<typeof checkResult>;
export type Sample = z.infer<typeof sample>;
export type VersionSummary = z.infer<typeof versionSummary>;
export type VersionDetail = z.infer<typeof versionDetail>;
export type ResolvedVersion = z.infer<typeof resolvedVersion>;
export type Spectrum = z.infer<typeof spectrum>;
