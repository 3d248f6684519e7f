import { asc, eq, sql } from 'drizzle-orm';
import type { DatasetWithVersions } from '../../schemas/dataset.ts';
import type { MaterialSummary } from '../../schemas/material.ts';
import type { MaterialDetail } from '../../schemas/material-detail.ts';
import { database, type Executor } from '../db/client.ts';
import { dataset } from '../db/schema/dataset.ts';
import { material } from '../db/schema/material.ts';
import { NotFound } from '../errors.ts';
import { selectVersions, sourcesOf, toSummary } from './read-versions.ts';

/** Reading materials. Their list with filters is in search.ts. */

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
		.select({ slug: dataset.slug, title: dataset.title })
		.from(dataset)
		.where(eq(dataset.materialId, row.id))
		.orderBy(asc(dataset.slug));
	const shown = datasets
		.map(({ slug: datasetSlug, title }): DatasetWithVersions => {
			const own = versions.filter((one) => one.datasetSlug === datasetSlug);
			const latest = own.find(({ state }) => state === 'published');
			return {
				slug: datasetSlug,
				title,
				latest: latest ? `${latest.major}.${latest.minor}` : null,
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
