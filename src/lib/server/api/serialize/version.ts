import type { VersionDetail, VersionSummary } from '../../../schemas/version.ts';
import { serializeSource } from './source.ts';

/** Addresses of a version in the API. */
export const versionApiPath = (slug: string, number: string): string =>
	`/api/v1/datasets/${slug}/versions/${number}`;

export const serializeVersionSummary = (version: VersionSummary) => ({
	ref: version.ref,
	number: version.number,
	state: version.state,
	quality: version.quality,
	qualityReason: version.qualityReason,
	kind: version.kind,
	modelKind: version.modelKind,
	measuredRangeEv: version.measuredRangeEv,
	validRangeEv: version.validRangeEv,
	staticPermittivity: version.staticPermittivity,
	conducts: version.conducts,
	checksum: version.checksum,
	fingerprint: version.fingerprint,
	note: version.note,
	publishedAt: version.publishedAt,
	publishedBy: version.publishedBy,
	supersededBy: version.supersededBy,
	sources: version.sources.map(serializeSource)
});

export function serializeVersion(version: VersionDetail) {
	const { dataset, material, number, table } = version;
	const self = versionApiPath(dataset.slug, number);
	return {
		...serializeVersionSummary(version),
		dataset: { slug: dataset.slug, title: dataset.title },
		material: {
			slug: material.slug,
			name: material.name,
			formula: material.formula,
			class: material.class,
			hazards: material.hazards
		},
		model: version.model,
		checks: version.checks.map(({ code, severity, message, figure, threshold, answer }) => ({
			code,
			severity,
			message,
			figure,
			threshold,
			answer
		})),
		sample: version.sample,
		parent: version.parent,
		successors: version.successors,
		createdAt: version.createdAt,
		withdrawn: version.withdrawn,
		table: table && {
			abscissaUnit: table.abscissaUnit,
			quantities: table.quantities,
			rowCount: table.rowCount,
			raw: table.raw
		},
		links: {
			self,
			page: `/datasets/${dataset.slug}/versions/${number}`,
			material: `/api/v1/materials/${material.slug}`,
			model: `${self}/model.json`,
			table: table ? `${self}/table.csv` : null,
			raw: table?.raw ? `${self}/raw` : null,
			citation: `${self}/citation.bib`,
			parent: version.parent ? versionApiPath(dataset.slug, version.parent) : null,
			supersededBy: version.supersededBy ? versionApiPath(dataset.slug, version.supersededBy) : null
		}
	};
}
