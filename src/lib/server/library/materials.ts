import { and, asc, eq, exists, like, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { DatasetWithVersions } from '../../schemas/dataset.ts';
import type { MaterialQuery, MaterialSummary } from '../../schemas/material.ts';
import type { MaterialDetail } from '../../schemas/material-detail.ts';
import { decodeCursor, page } from '../api/paginate.ts';
import { database, type Executor } from '../db/client.ts';
import { dataset, version } from '../db/schema/dataset.ts';
import { material } from '../db/schema/material.ts';
import { NotFound } from '../errors.ts';
import { selectVersions, sourcesOf, toSummary } from './read-versions.ts';
import { containing, searchWords } from './search-text.ts';

/** Reading materials. The library's table, a row a dataset, is in search.ts. */

export type MaterialRow = typeof material.$inferSelect;

export const toMaterial = (
	row: MaterialRow,
	datasetCount: number,
	versionCount: number
): MaterialSummary => ({
	slug: row.slug,
	name: row.name,
	formula: row.formula,
	class: row.class,
	densityGPerCm3: row.densityGPerCm3,
	aliases: row.aliases,
	casNumber: row.casNumber,
	staticPermittivity: row.staticPermittivity,
	staticPermittivitySource: row.staticPermittivitySource,
	refractiveIndexD: row.refractiveIndexD,
	notes: row.notes,
	hazards: row.hazards,
	datasetCount,
	versionCount
});

/** Columns spelled out: in a query of one table Drizzle drops the table's name, which would be another id here. */
const PUBLISHED_VERSIONS = sql<number>`(
	select count(*) from version join dataset on dataset.id = version.dataset_id
	where dataset.material_id = material.id and version.state = 'published')::int`;

const PUBLISHED_DATASETS = sql<number>`(
	select count(distinct dataset.id) from version join dataset on dataset.id = version.dataset_id
	where dataset.material_id = material.id and version.state in ('published', 'withdrawn'))::int`;

const cursorKey = z.tuple([z.string(), z.string()]);

/** By name. Quality and energy ask for a published version that has them, whichever dataset it belongs to. */
export async function list(
	query: MaterialQuery,
	executor: Executor = database()
): Promise<{ materials: MaterialSummary[]; next: string | null }> {
	const name = sql<string>`lower(${material.name})`;
	const parts: SQL[] = searchWords(query.search).map((word) => like(material.searchText, containing(word)));
	if (query.class) parts.push(eq(material.class, query.class));
	if (query.quality || query.coversEv !== undefined) parts.push(hasVersion(query, executor));
	if (query.cursor) {
		const [afterName, afterSlug] = decodeCursor(query.cursor, cursorKey);
		parts.push(sql`(${name}, ${material.slug}) > (${afterName}::text, ${afterSlug}::text)`);
	}
	const rows = await executor
		.select({ row: material, name, datasetCount: PUBLISHED_DATASETS, versionCount: PUBLISHED_VERSIONS })
		.from(material)
		.where(and(...parts))
		.orderBy(name, asc(material.slug))
		.limit(query.limit + 1);
	const { rows: shown, next } = page(rows, query.limit, ({ name: key, row }) => [key, row.slug]);
	return {
		materials: shown.map(({ row, datasetCount, versionCount }) =>
			toMaterial(row, datasetCount, versionCount)
		),
		next
	};
}

function hasVersion({ quality, coversEv }: MaterialQuery, executor: Executor): SQL {
	const parts = [eq(dataset.materialId, material.id), eq(version.state, 'published')];
	if (quality) parts.push(eq(version.quality, quality));
	if (coversEv !== undefined)
		parts.push(sql`${version.measuredLowEv} <= ${coversEv} and ${version.measuredHighEv} >= ${coversEv}`);
	return exists(
		executor
			.select({ id: version.id })
			.from(version)
			.innerJoin(dataset, eq(version.datasetId, dataset.id))
			.where(and(...parts))
	);
}

/** A material with its datasets, and of each the versions that may be seen, newest first. */
export async function get(slug: string, executor: Executor = database()): Promise<MaterialDetail> {
	const [row] = await executor.select().from(material).where(eq(material.slug, slug));
	if (!row) throw new NotFound(`There is no material "${slug}" in the library.`);
	const versions = await selectVersions(executor, eq(material.id, row.id));
	const sources = await sourcesOf(
		executor,
		versions.map(({ id }) => id)
	);
	const datasets = await executor
		.select({
			slug: dataset.slug,
			title: dataset.title,
			major: dataset.recommendedMajor,
			minor: dataset.recommendedMinor
		})
		.from(dataset)
		.where(eq(dataset.materialId, row.id))
		.orderBy(asc(dataset.slug));
	const shown = datasets
		.map(({ slug: datasetSlug, title, major, minor }): DatasetWithVersions => {
			const own = versions.filter((one) => one.datasetSlug === datasetSlug);
			const latest = own.find(({ state }) => state === 'published');
			return {
				slug: datasetSlug,
				title,
				latest: latest ? `${latest.major}.${latest.minor}` : null,
				recommended: major === null || minor === null ? null : `${major}.${minor}`,
				versions: own.map((one) => toSummary(one, sources.get(one.id) ?? []))
			};
		})
		.filter((one) => one.versions.length > 0);
	const published = versions.filter(({ state }) => state === 'published').length;
	return { ...toMaterial(row, shown.length, published), datasets: shown };
}

/** Counts for health pages and the foot of the library. */
export async function count(
	executor: Executor = database()
): Promise<{ materials: number; versions: number }> {
	const [row] = await executor.execute<{ materials: number; versions: number }>(sql`
		select (select count(*) from material)::int as materials,
			(select count(*) from version where state = 'published')::int as versions`);
	return { materials: row.materials, versions: row.versions };
}
