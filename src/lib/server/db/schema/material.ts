import { sql } from 'drizzle-orm';
import { check, doublePrecision, index, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import type { Hazards, MaterialClass } from '../../../schemas/material.ts';
import { instant, isFinite, isOneOf, isSlug } from './columns.ts';

export const MATERIAL_CLASSES = ['metal', 'semiconductor', 'insulator', 'polymer', 'liquid', 'gas'] as const;

export const material = pgTable(
	'material',
	{
		id: uuid().primaryKey().defaultRandom(),
		slug: text().notNull(),
		name: text().notNull(),
		formula: text(),
		class: text().$type<MaterialClass>().notNull(),
		densityGPerCm3: doublePrecision(),
		aliases: text()
			.array()
			.notNull()
			.default(sql`'{}'::text[]`),
		casNumber: text(),
		staticPermittivity: doublePrecision(),
		staticPermittivitySource: text(),
		refractiveIndexD: doublePrecision(),
		notes: text(),
		hazards: jsonb().$type<Hazards>(),
		/** Name, formula and aliases in lower case; kept by the service, served by a trigram index. */
		searchText: text().notNull(),
		createdAt: instant().notNull().defaultNow()
	},
	(table) => [
		unique('material_slug_key').on(table.slug),
		check('material_slug_form', isSlug(table.slug)),
		check('material_class_known', isOneOf(table.class, MATERIAL_CLASSES)),
		check(
			'material_density_positive',
			sql`${table.densityGPerCm3} > 0 and ${isFinite(table.densityGPerCm3)}`
		),
		check(
			'material_static_permittivity_range',
			sql`${table.staticPermittivity} >= 1 and ${isFinite(table.staticPermittivity)}`
		),
		check(
			'material_refractive_index_range',
			sql`${table.refractiveIndexD} > 0 and ${isFinite(table.refractiveIndexD)}`
		),
		index('material_class_name_index').on(table.class, table.name),
		index('material_name_index').on(table.name),
		index('material_search_index').using('gin', sql`${table.searchText} gin_trgm_ops`)
	]
);
