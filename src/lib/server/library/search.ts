import { sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { PermittivityModel } from '../../engine/contract.ts';
import type {
	LibraryPage,
	LibraryQuery,
	LibraryRow,
	LibrarySort,
	MaterialClass
} from '../../schemas/material.ts';
import type { Quality } from '../../schemas/version.ts';
import { decodeCursor, page } from '../api/paginate.ts';
import { database, type Executor } from '../db/client.ts';
import { shortCitation } from './citation.ts';
import { extrapolatedRange } from './extrapolated-range.ts';
import { rangeOf } from './read-versions.ts';
import { containing, folded, searchWords } from './search-text.ts';

/** The library's table: one row a dataset with its newest published version, found, filtered, sorted and paged. */

interface Found extends Record<string, unknown> {
	sort_key: string | number;
	tie: string;
	material_slug: string;
	material_name: string;
	formula: string | null;
	class: MaterialClass;
	hazardous: boolean;
	dataset_slug: string | null;
	title: string;
	major: number;
	minor: number;
	quality: Quality;
	quality_reason: string | null;
	measured_low_ev: number | null;
	measured_high_ev: number | null;
	valid_low_ev: number | null;
	valid_high_ev: number | null;
	model: PermittivityModel;
	conducts: boolean;
	static_permittivity: number | null;
	published_at: string;
	version_count: number;
	first_source: { authors: string[]; year: number };
	source_count: number;
}

/** The source that lists name. A subquery of the shown rows, not a join: PostgreSQL then looks it up after the limit. */
const FIRST_SOURCE = sql`
	from version_source join source on source.id = version_source.source_id
	where version_source.version_id = latest.id order by version_source.position limit 1`;

/** Conductors sort as what they are: an infinite static value. Each key ends in a tie-break that is unique. */
const SORT_KEYS: Record<LibrarySort, SQL> = {
	material: sql`lower(material.name)`,
	class: sql`material.class || ' ' || lower(material.name)`,
	dataset: sql`lower(coalesce(dataset.title, ''))`,
	static: sql`case when latest.conducts then 1e300::float8 else coalesce(latest.static_permittivity, 0) end`,
	source: sql`lower(coalesce((select source.authors[1] || source.year ${FIRST_SOURCE}), ''))`,
	quality: sql`coalesce(latest.quality, '')`,
	published: sql`coalesce(extract(epoch from latest.published_at), 0)::float8`
};

/** With a search, "by material" means the best hit first: the formula or name itself, then names that begin with it. */
function sortKey({ sort, search }: LibraryQuery): SQL {
	const text = folded(search);
	if (sort !== 'material' || text === '') return SORT_KEYS[sort];
	const begins = containing(text).slice(1);
	return sql`case when lower(material.formula) = ${text} or lower(material.name) = ${text} or material.slug = ${text} then '0'
		when lower(material.name) like ${begins} or dataset.slug like ${begins} then '1'
		when material.search_text like ${containing(text)} then '2' else '3' end || lower(material.name)`;
}

const TIE = sql`coalesce(dataset.slug, material.slug)`;

const FROM = sql`
	from material
	left join dataset on dataset.material_id = material.id and exists (
		select from version where version.dataset_id = dataset.id and version.state = 'published')
	left join lateral (
		select * from version where version.dataset_id = dataset.id and version.state = 'published'
		order by version.major desc, version.minor desc limit 1) as latest on true`;

const cursorKey = z.tuple([z.union([z.string(), z.number()]), z.string()]);

export async function rows(query: LibraryQuery, executor: Executor = database()): Promise<LibraryPage> {
	const key = sortKey(query);
	const matching = conditions(query);
	const down = query.direction === 'descending';
	const after = query.cursor ? [afterCursor(query, key, down)] : [];
	const order = down ? sql`order by ${key} desc, ${TIE} desc` : sql`order by ${key}, ${TIE}`;
	const found = await executor.execute<Found>(sql`
		select ${key} as sort_key, ${TIE} as tie, material.slug as material_slug, material.name as material_name,
			material.formula, material.class,
			coalesce(jsonb_array_length(material.hazards -> 'statements'), 0) > 0 as hazardous,
			dataset.slug as dataset_slug, dataset.title, latest.major, latest.minor, latest.quality, latest.quality_reason,
			latest.measured_low_ev, latest.measured_high_ev, latest.valid_low_ev, latest.valid_high_ev, latest.model,
			latest.conducts, latest.static_permittivity,
			to_char(latest.published_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as published_at,
			(select count(*) from version where version.dataset_id = dataset.id and version.state = 'published')::int
				as version_count,
			(select jsonb_build_object('authors', source.authors, 'year', source.year) ${FIRST_SOURCE}) as first_source,
			(select count(*) from version_source where version_source.version_id = latest.id)::int as source_count
		${FROM} ${where([...matching, ...after])} ${order} limit ${query.limit + 1}`);
	const { rows: shown, next } = page([...found], query.limit, (row) => [row.sort_key, row.tie]);
	return { rows: shown.map(toRow), next, counts: await counts(query, executor) };
}

async function counts(query: LibraryQuery, executor: Executor): Promise<LibraryPage['counts']> {
	const [row] = await executor.execute<{ versions: number; materials: number; without: number }>(sql`
		select coalesce(sum((select count(*) from version
				where version.dataset_id = dataset.id and version.state = 'published')), 0)::int as versions,
			(count(distinct material.id) filter (where dataset.id is not null))::int as materials,
			(count(distinct material.id) filter (where dataset.id is null))::int as without
		${FROM} ${where(conditions({ ...query, withoutData: true }))}`);
	return { versions: row.versions, materials: row.materials, materialsWithoutData: row.without };
}

const where = (parts: SQL[]): SQL => (parts.length > 0 ? sql`where ${sql.join(parts, sql` and `)}` : sql``);

function conditions(query: LibraryQuery): SQL[] {
	const parts = searchWords(query.search).map(matchesWord);
	if (query.class) parts.push(sql`material.class = ${query.class}`);
	if (query.quality) parts.push(sql`latest.quality = ${query.quality}`);
	if (query.coversEv !== undefined)
		parts.push(
			sql`latest.measured_low_ev <= ${query.coversEv} and latest.measured_high_ev >= ${query.coversEv}`
		);
	if (!query.withoutData) parts.push(sql`dataset.id is not null`);
	return parts;
}

/** Every word must be found in the material, the dataset or one of its sources. */
function matchesWord(word: string): SQL {
	const pattern = containing(word);
	return sql`(material.search_text like ${pattern} or lower(dataset.title) like ${pattern}
		or dataset.slug like ${pattern} or exists (
			select from version_source join source on source.id = version_source.source_id
			where version_source.version_id = latest.id and source.search_text like ${pattern}))`;
}

function afterCursor({ cursor = '', sort }: LibraryQuery, key: SQL, down: boolean): SQL {
	const [value, tie] = decodeCursor(cursor, cursorKey);
	const typed =
		sort === 'static' || sort === 'published' ? sql`${Number(value)}::float8` : sql`${String(value)}::text`;
	return down
		? sql`(${key}, ${TIE}) < (${typed}, ${tie}::text)`
		: sql`(${key}, ${TIE}) > (${typed}, ${tie}::text)`;
}

function toRow(row: Found): LibraryRow {
	const material = {
		slug: row.material_slug,
		name: row.material_name,
		formula: row.formula,
		class: row.class,
		hazardous: row.hazardous
	};
	if (row.dataset_slug === null) return { material, dataset: null };
	const number = `${row.major}.${row.minor}`;
	return {
		material,
		dataset: {
			slug: row.dataset_slug,
			title: row.title,
			ref: `${row.dataset_slug}@${number}`,
			number,
			quality: row.quality,
			qualityReason: row.quality_reason,
			measuredRangeEv: rangeOf(row.measured_low_ev, row.measured_high_ev),
			validRangeEv: rangeOf(row.valid_low_ev, row.valid_high_ev),
			extrapolatedEv: extrapolatedRange(row.model),
			conducts: row.conducts,
			staticPermittivity: row.static_permittivity,
			source: shortCitation(row.first_source),
			furtherSources: row.source_count - 1,
			publishedAt: row.published_at,
			versionCount: row.version_count
		}
	};
}
