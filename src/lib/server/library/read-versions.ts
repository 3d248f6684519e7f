import { and, asc, desc, eq, inArray, sql, type SQL } from 'drizzle-orm';
import type { AnyPgColumn } from 'drizzle-orm/pg-core';
import type { Source } from '../../schemas/source.ts';
import type { VersionSummary } from '../../schemas/version.ts';
import type { Executor } from '../db/client.ts';
import { dataset, version, versionSource } from '../db/schema/dataset.ts';
import { material } from '../db/schema/material.ts';
import { source } from '../db/schema/source.ts';
import { shortCitation } from './citation.ts';
import { visibleTo, type Viewer } from './viewer.ts';

/** Versions with their dataset, material and sources, in a fixed number of queries however many are asked for. */

/** Accounts act by their number and are shown by their name, which a deleted one keeps. */
export const nameOf = (actor: AnyPgColumn) => sql<string | null>`case
	when ${actor} ~ '^[0-9a-f]{8}-[0-9a-f-]{27}$'
	then coalesce((select person.name from person where person.id = ${actor}::uuid), ${actor})
	else ${actor} end`;

const SUMMARY = {
	id: version.id,
	datasetId: version.datasetId,
	major: version.major,
	minor: version.minor,
	state: version.state,
	quality: version.quality,
	qualityReason: version.qualityReason,
	kind: version.kind,
	modelKind: sql<string>`${version.model} ->> 'kind'`,
	measuredLowEv: version.measuredLowEv,
	measuredHighEv: version.measuredHighEv,
	validLowEv: version.validLowEv,
	validHighEv: version.validHighEv,
	staticPermittivity: version.staticPermittivity,
	conducts: version.conducts,
	checksum: version.checksum,
	fingerprint: version.fingerprint,
	note: version.note,
	publishedAt: version.publishedAt,
	publishedBy: nameOf(version.publishedBy),
	datasetSlug: dataset.slug,
	datasetTitle: dataset.title,
	materialSlug: material.slug,
	materialName: material.name,
	formula: material.formula,
	materialClass: material.class,
	hazards: material.hazards,
	/** Of the dataset's newest published version, where that is a later one. */
	supersededBy: sql<string | null>`(
		select later.major || '.' || later.minor from ${version} as later
		where later.dataset_id = ${version.datasetId} and later.state = 'published'
			and (later.major, later.minor) > (${version.major}, ${version.minor})
		order by later.major desc, later.minor desc limit 1)`
};

/** Newest first within each dataset. */
export function selectVersions(executor: Executor, where: SQL | undefined, viewer: Viewer | null = null) {
	return executor
		.select(SUMMARY)
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.innerJoin(material, eq(dataset.materialId, material.id))
		.where(and(visibleTo(viewer), where))
		.orderBy(asc(dataset.slug), desc(version.major), desc(version.minor));
}

export type VersionRow = Awaited<ReturnType<typeof selectVersions>>[number];

/** Sources of each version, in their order. */
export async function sourcesOf(executor: Executor, versionIds: string[]): Promise<Map<string, Source[]>> {
	const byVersion = new Map<string, Source[]>(versionIds.map((id) => [id, []]));
	if (versionIds.length === 0) return byVersion;
	const rows = await executor
		.select({ versionId: versionSource.versionId, source })
		.from(versionSource)
		.innerJoin(source, eq(versionSource.sourceId, source.id))
		.where(inArray(versionSource.versionId, versionIds))
		.orderBy(asc(versionSource.versionId), asc(versionSource.position));
	for (const row of rows) byVersion.get(row.versionId)?.push(toSource(row.source));
	return byVersion;
}

export const toSource = (row: typeof source.$inferSelect): Source => ({
	slug: row.slug,
	title: row.title,
	authors: row.authors,
	year: row.year,
	kind: row.kind,
	container: row.container,
	volume: row.volume,
	pages: row.pages,
	doi: row.doi,
	url: row.url,
	licence: row.licence,
	note: row.note,
	citation: shortCitation(row)
});

export const rangeOf = (low: number | null, high: number | null): { low: number; high: number } | null =>
	low === null || high === null ? null : { low, high };

export const toSummary = (row: VersionRow, sources: Source[]): VersionSummary => ({
	ref: `${row.datasetSlug}@${row.major}.${row.minor}`,
	number: `${row.major}.${row.minor}`,
	state: row.state,
	quality: row.quality,
	qualityReason: row.qualityReason,
	kind: row.kind,
	modelKind: row.modelKind,
	measuredRangeEv: rangeOf(row.measuredLowEv, row.measuredHighEv),
	validRangeEv: rangeOf(row.validLowEv, row.validHighEv),
	staticPermittivity: row.staticPermittivity,
	conducts: row.conducts,
	checksum: row.checksum,
	fingerprint: row.fingerprint,
	note: row.note,
	publishedAt: row.publishedAt?.toISOString() ?? null,
	publishedBy: row.publishedBy,
	supersededBy: row.supersededBy,
	sources
});
