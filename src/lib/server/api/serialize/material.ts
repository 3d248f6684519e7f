import type { MaterialSummary } from '../../../schemas/material.ts';
import type { MaterialDetail } from '../../../schemas/material-detail.ts';
import { serializeVersionSummary, versionApiPath } from './version.ts';

export const serializeMaterial = (material: MaterialSummary) => ({
	slug: material.slug,
	name: material.name,
	formula: material.formula,
	class: material.class,
	densityGPerCm3: material.densityGPerCm3,
	aliases: material.aliases,
	casNumber: material.casNumber,
	staticPermittivity: material.staticPermittivity,
	staticPermittivitySource: material.staticPermittivitySource,
	refractiveIndexD: material.refractiveIndexD,
	notes: material.notes,
	hazards: material.hazards,
	datasetCount: material.datasetCount,
	versionCount: material.versionCount,
	links: { self: `/api/v1/materials/${material.slug}`, page: `/materials/${material.slug}` }
});

export const serializeMaterialDetail = (material: MaterialDetail) => ({
	...serializeMaterial(material),
	datasets: material.datasets.map(({ slug, title, latest, recommended, versions }) => ({
		slug,
		title,
		latest,
		recommended,
		links: { latest: latest ? versionApiPath(slug, latest) : null },
		versions: versions.map(serializeVersionSummary)
	}))
});
