import { sql } from 'drizzle-orm';
import {
	boolean,
	check,
	doublePrecision,
	foreignKey,
	index,
	integer,
	jsonb,
	pgTable,
	primaryKey,
	smallint,
	text,
	unique,
	uuid
} from 'drizzle-orm/pg-core';
import type { PermittivityModel } from '../../../engine/contract.ts';
import type { CheckSeverity, Quality, Sample, VersionKind, VersionState } from '../../../schemas/version.ts';
import { allFinite, bytes, instant, isFinite, isOneOf, isSlug } from './columns.ts';
import { material } from './material.ts';
import { source } from './source.ts';

export const VERSION_STATES = ['draft', 'in_review', 'published', 'withdrawn'] as const;
export const QUALITIES = ['checked', 'provisional'] as const;

export const dataset = pgTable(
	'dataset',
	{
		id: uuid().primaryKey().defaultRandom(),
		slug: text().notNull(),
		title: text().notNull(),
		materialId: uuid()
			.notNull()
			.references(() => material.id, { onDelete: 'restrict' }),
		/** What a curator recommends, which need not be the newest; null: no choice was stated. */
		recommendedMajor: integer(),
		recommendedMinor: integer(),
		createdAt: instant().notNull().defaultNow()
	},
	(table) => [
		unique('dataset_slug_key').on(table.slug),
		check(
			'dataset_recommended_whole',
			sql`num_nonnulls(${table.recommendedMajor}, ${table.recommendedMinor}) in (0, 2)`
		),
		check('dataset_slug_form', isSlug(table.slug)),
		index('dataset_material_index').on(table.materialId, table.slug)
	]
);

/** What the columns of a table meant when it came in; the numbers stand beside it as they were given. */
export interface GivenColumns {
	abscissaUnit: string;
	quantities: string[];
	/** A second table that was joined to the file, as it was typed. */
	joined?: string;
}

/** Stated uncertainties of a column, row by row as the numbers themselves. */
export interface GivenUncertainty {
	quantity: string;
	values: number[];
}

export const version = pgTable(
	'version',
	{
		id: uuid().primaryKey().defaultRandom(),
		datasetId: uuid()
			.notNull()
			.references(() => dataset.id, { onDelete: 'restrict' }),
		major: integer().notNull(),
		minor: integer().notNull(),
		state: text().$type<VersionState>().notNull().default('draft'),
		quality: text().$type<Quality>().notNull(),
		qualityReason: text(),
		kind: text().$type<VersionKind>().notNull(),
		/** The contract's MODEL: what the engine is given. */
		model: jsonb().$type<PermittivityModel>().notNull(),
		/** sha256 of the canonical JSON of the model. */
		checksum: text().notNull(),
		/** sha256 of the values alone, so that the same numbers in another file are recognised. */
		fingerprint: text().notNull(),
		conducts: boolean().notNull(),
		/** eps(0) of the model; null where it conducts. */
		staticPermittivity: doublePrecision(),
		measuredLowEv: doublePrecision(),
		measuredHighEv: doublePrecision(),
		validLowEv: doublePrecision(),
		validHighEv: doublePrecision(),
		temperatureK: doublePrecision(),
		sample: jsonb().$type<Sample>(),
		note: text(),
		parentId: uuid(),
		givenColumns: jsonb().$type<GivenColumns>(),
		givenAbscissa: doublePrecision().array(),
		givenFirst: doublePrecision().array(),
		givenSecond: doublePrecision().array(),
		givenUncertainties: jsonb().$type<GivenUncertainty[]>(),
		/** eps' over the energies of the model, where the table had it. */
		epsilon1: doublePrecision().array(),
		raw: bytes(),
		rawName: text(),
		rawSha256: text(),
		createdAt: instant().notNull().defaultNow(),
		createdBy: text().notNull(),
		submittedAt: instant(),
		submittedBy: text(),
		publishedAt: instant(),
		publishedBy: text(),
		withdrawnAt: instant(),
		withdrawnBy: text(),
		withdrawnReason: text()
	},
	(table) => [
		unique('version_number_key').on(table.datasetId, table.major, table.minor),
		foreignKey({
			name: 'version_parent_fk',
			columns: [table.parentId],
			foreignColumns: [table.id]
		}).onDelete('restrict'),
		check('version_number_range', sql`${table.major} >= 0 and ${table.minor} >= 0`),
		check('version_state_known', isOneOf(table.state, VERSION_STATES)),
		check('version_quality_known', isOneOf(table.quality, QUALITIES)),
		check(
			'version_provisional_has_reason',
			sql`${table.quality} = 'checked' or length(trim(${table.qualityReason})) > 0`
		),
		check('version_kind_known', isOneOf(table.kind, ['table', 'model'])),
		check(
			'version_model_form',
			sql`jsonb_typeof(${table.model}) = 'object' and jsonb_typeof(${table.model} -> 'kind') = 'string'`
		),
		check('version_checksum_form', sql`${table.checksum} ~ '^sha256:[0-9a-f]{64}$'`),
		check('version_fingerprint_form', sql`${table.fingerprint} ~ '^sha256:[0-9a-f]{64}$'`),
		check(
			'version_static_permittivity_of_insulators',
			sql`(${table.conducts} and ${table.staticPermittivity} is null) or (not ${table.conducts} and ${table.staticPermittivity} is not null and ${isFinite(table.staticPermittivity)})`
		),
		check(
			'version_measured_range',
			sql`(${table.measuredLowEv} is null and ${table.measuredHighEv} is null) or (${table.measuredLowEv} >= 0 and ${table.measuredLowEv} < ${table.measuredHighEv} and ${table.measuredHighEv} < 'Infinity')`
		),
		check(
			'version_valid_range',
			sql`(${table.validLowEv} is null and ${table.validHighEv} is null) or (${table.validLowEv} >= 0 and ${table.validLowEv} < ${table.validHighEv} and ${table.validHighEv} < 'Infinity')`
		),
		check('version_temperature_range', sql`${table.temperatureK} > 0 and ${isFinite(table.temperatureK)}`),
		check('version_given_abscissa_finite', allFinite(table.givenAbscissa)),
		check('version_given_first_finite', allFinite(table.givenFirst)),
		check('version_given_second_finite', allFinite(table.givenSecond)),
		check('version_epsilon1_finite', allFinite(table.epsilon1)),
		check(
			'version_rows_complete',
			sql`${table.kind} = 'model' or (${table.givenColumns} is not null and cardinality(${table.givenAbscissa}) = cardinality(${table.givenFirst}) and (${table.givenSecond} is null or cardinality(${table.givenSecond}) = cardinality(${table.givenAbscissa})))`
		),
		check(
			'version_raw_complete',
			sql`num_nonnulls(${table.raw}, ${table.rawName}, ${table.rawSha256}) in (0, 3)`
		),
		check(
			'version_published_by_another',
			sql`${table.publishedBy} is null or ${table.publishedBy} = 'installation' or ${table.publishedBy} <> ${table.submittedBy}`
		),
		check(
			'version_published_by_another_than_made',
			sql`${table.publishedBy} is null or ${table.publishedBy} = 'installation' or ${table.publishedBy} <> ${table.createdBy}`
		),
		check(
			'version_published_fields',
			sql`(${table.state} in ('published', 'withdrawn')) = (${table.publishedAt} is not null and ${table.publishedBy} is not null)`
		),
		check(
			'version_withdrawn_fields',
			sql`(${table.state} = 'withdrawn') = (${table.withdrawnAt} is not null and ${table.withdrawnBy} is not null and length(trim(${table.withdrawnReason})) > 0)`
		),
		index('version_latest_index').on(table.datasetId, table.state, table.major.desc(), table.minor.desc()),
		index('version_parent_index').on(table.parentId),
		index('version_fingerprint_index').on(table.fingerprint),
		index('version_measured_index').on(table.measuredLowEv, table.measuredHighEv)
	]
);

export const versionSource = pgTable(
	'version_source',
	{
		versionId: uuid()
			.notNull()
			.references(() => version.id, { onDelete: 'restrict' }),
		sourceId: uuid()
			.notNull()
			.references(() => source.id, { onDelete: 'restrict' }),
		/** 0 is the one that lists name. */
		position: smallint().notNull()
	},
	(table) => [
		primaryKey({ name: 'version_source_key', columns: [table.versionId, table.sourceId] }),
		unique('version_source_position_key').on(table.versionId, table.position),
		index('version_source_source_index').on(table.sourceId)
	]
);

export const checkResult = pgTable(
	'check_result',
	{
		versionId: uuid()
			.notNull()
			.references(() => version.id, { onDelete: 'restrict' }),
		code: text().notNull(),
		/** Order in which the checks are listed. */
		position: smallint().notNull(),
		severity: text().$type<CheckSeverity>().notNull(),
		message: text().notNull(),
		figure: doublePrecision(),
		threshold: doublePrecision(),
		/** Why the submitter let a warning stand. */
		answer: text()
	},
	(table) => [
		primaryKey({ name: 'check_result_key', columns: [table.versionId, table.code] }),
		check('check_result_severity_known', isOneOf(table.severity, ['fail', 'warn', 'info'])),
		check('check_result_figure_finite', isFinite(table.figure)),
		check('check_result_threshold_finite', isFinite(table.threshold))
	]
);
