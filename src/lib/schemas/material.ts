import { z } from 'zod';
import { line, lines } from './plain-text.ts';

/** A substance or sample class of the library, and how its list is asked for. */

export const materialClass = z.enum(['metal', 'semiconductor', 'insulator', 'polymer', 'liquid', 'gas']);

export const materialSlug = z
	.string()
	.max(80)
	.regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'lower-case letters, digits and single hyphens, as carbon-disulfide');

/** GHS words; `caution` is always shown with them. */
export const hazards = z
	.object({
		statements: z.array(z.object({ code: line(40), text: line(300) })).max(40),
		pictograms: z.array(z.object({ code: line(40), name: line(120) })).max(20),
		signalWord: z.enum(['Danger', 'Warning']).nullable(),
		/** Where the statements come from and whether they were compared. */
		status: line(500),
		flashPointC: z.number().nullable(),
		caution: line(500)
	})
	.meta({ id: 'Hazards' });

export const materialFields = z.strictObject({
	slug: materialSlug,
	name: line(120),
	formula: line(80).nullable().default(null),
	class: materialClass,
	densityGPerCm3: z.number().positive().nullable().default(null),
	aliases: z.array(line(80)).max(40).default([]),
	casNumber: z
		.string()
		.regex(/^\d{2,7}-\d{2}-\d$/)
		.nullable()
		.default(null),
	staticPermittivity: z.number().min(1).nullable().default(null),
	staticPermittivitySource: line(500).nullable().default(null),
	/** Measured index at the sodium D line. */
	refractiveIndexD: z.number().positive().nullable().default(null),
	notes: lines(4000).nullable().default(null),
	hazards: hazards.nullable().default(null)
});

export const materialSummary = materialFields
	.extend({
		datasetCount: z.int(),
		/** Published versions only. */
		versionCount: z.int()
	})
	.meta({ id: 'Material' });

export const librarySort = z.enum([
	'material',
	'class',
	'dataset',
	'static',
	'source',
	'quality',
	'published'
]);

const optionalEv = z.coerce.number().positive().max(1e7).optional();

/** Query of the library page and of GET /api/v1/materials; unknown words are refused, empty ones mean "any". */
export const libraryQuery = z.object({
	search: z.string().trim().max(200).default(''),
	class: z.preprocess((value) => (value === '' ? undefined : value), materialClass.optional()),
	quality: z.preprocess(
		(value) => (value === '' ? undefined : value),
		z.enum(['checked', 'provisional']).optional()
	),
	/** hbar*omega in eV that the measured range must contain. */
	coversEv: z.preprocess((value) => (value === '' ? undefined : value), optionalEv),
	sort: librarySort.default('material'),
	direction: z.enum(['ascending', 'descending']).default('ascending'),
	/** Also materials that have no dataset yet. */
	withoutData: z.preprocess((value) => value === '1' || value === 'true' || value === true, z.boolean()),
	cursor: z.string().max(400).optional(),
	limit: z.coerce.number().int().min(1).max(200).default(100)
});

/** Query of GET /api/v1/materials. */
export const materialQuery = libraryQuery.pick({
	search: true,
	class: true,
	quality: true,
	coversEv: true,
	cursor: true,
	limit: true
});

export const materialPage = z.object({ materials: z.array(materialSummary), next: z.string().nullable() });

/** One line of the library's table: a dataset with its newest published version, or a material without any. */
export const libraryRow = z.object({
	material: z.object({
		slug: materialSlug,
		name: z.string(),
		formula: z.string().nullable(),
		class: materialClass,
		hazardous: z.boolean()
	}),
	dataset: z
		.object({
			slug: z.string(),
			title: z.string(),
			ref: z.string(),
			number: z.string(),
			quality: z.enum(['checked', 'provisional']),
			qualityReason: z.string().nullable(),
			measuredRangeEv: z.object({ low: z.number(), high: z.number() }).nullable(),
			validRangeEv: z.object({ low: z.number(), high: z.number() }).nullable(),
			/** What eps rests on outside the measured range, for the dotted part of the bar; null: nothing there. */
			extrapolatedEv: z.object({ low: z.number(), high: z.number() }).nullable(),
			conducts: z.boolean(),
			staticPermittivity: z.number().nullable(),
			/** Short citation of the first source, and how many more there are. */
			source: z.string(),
			furtherSources: z.int(),
			publishedAt: z.iso.datetime(),
			versionCount: z.int()
		})
		.nullable()
});

export const libraryPage = z.object({
	rows: z.array(libraryRow),
	next: z.string().nullable(),
	/** Of everything that fits the query, not of this page. */
	counts: z.object({ versions: z.int(), materials: z.int(), materialsWithoutData: z.int() })
});

export type MaterialClass = z.infer<typeof materialClass>;
export type Hazards = z.infer<typeof hazards>;
export type MaterialFields = z.infer<typeof materialFields>;
export type MaterialSummary = z.infer<typeof materialSummary>;
export type LibraryQuery = z.infer<typeof libraryQuery>;
export type MaterialQuery = z.infer<typeof materialQuery>;
export type LibrarySort = z.infer<typeof librarySort>;
export type LibraryRow = z.infer<typeof libraryRow>;
export type LibraryPage = z.infer<typeof libraryPage>;
