import { sql } from 'drizzle-orm';
import { check, index, integer, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import type { SourceKind } from '../../../schemas/source.ts';
import { instant, isOneOf, isSlug } from './columns.ts';

export const SOURCE_KINDS = ['article', 'book', 'measurement', 'standard', 'computation'] as const;

export const source = pgTable(
	'source',
	{
		id: uuid().primaryKey().defaultRandom(),
		slug: text().notNull(),
		title: text().notNull(),
		authors: text().array().notNull(),
		year: integer().notNull(),
		kind: text().$type<SourceKind>().notNull(),
		container: text(),
		volume: text(),
		pages: text(),
		doi: text(),
		url: text(),
		/** SPDX identifier; null where only facts were taken. */
		licence: text(),
		note: text(),
		/** Authors, title and DOI in lower case; kept by the service, served by a trigram index. */
		searchText: text().notNull(),
		createdAt: instant().notNull().defaultNow()
	},
	(table) => [
		unique('source_slug_key').on(table.slug),
		check('source_slug_form', isSlug(table.slug)),
		check('source_kind_known', isOneOf(table.kind, SOURCE_KINDS)),
		check('source_authors_given', sql`cardinality(${table.authors}) > 0`),
		check('source_year_range', sql`${table.year} between 1600 and 2200`),
		check('source_doi_form', sql`${table.doi} like '10.%/%'`),
		check('source_url_form', sql`${table.url} ~ '^https?://'`),
		index('source_search_index').using('gin', sql`${table.searchText} gin_trgm_ops`)
	]
);
