import { and, asc, desc, eq, inArray } from 'drizzle-orm';
import { database } from '../db/client.ts';
import { dataset, version } from '../db/schema/dataset.ts';
import { material } from '../db/schema/material.ts';
import { source } from '../db/schema/source.ts';
import { shortCitation } from './citation.ts';
import { PUBLIC_STATES } from './viewer.ts';

/** What the curators' forms offer to choose from. */

export interface Choice {
	slug: string;
	text: string;
}

export async function choices(): Promise<{ datasets: Choice[]; materials: Choice[]; sources: Choice[] }> {
	const [datasets, materials, sources] = await Promise.all([
		database()
			.select({ slug: dataset.slug, title: dataset.title, material: material.name })
			.from(dataset)
			.innerJoin(material, eq(dataset.materialId, material.id))
			.orderBy(asc(dataset.slug)),
		database()
			.select({ slug: material.slug, text: material.name })
			.from(material)
			.orderBy(asc(material.name)),
		database()
			.select({ slug: source.slug, authors: source.authors, year: source.year, title: source.title })
			.from(source)
			.orderBy(asc(source.slug))
	]);
	return {
		datasets: datasets.map(({ slug, title, material: name }) => ({ slug, text: `${name}: ${title}` })),
		materials,
		sources: sources.map(({ slug, authors, year, title }) => ({
			slug,
			text: `${shortCitation({ authors, year })}: ${title}`
		}))
	};
}

/** Numbers that a new version of the dataset may name as its parent, newest first. */
export async function publishedNumbers(slug: string | null): Promise<string[]> {
	if (!slug) return [];
	const rows = await database()
		.select({ major: version.major, minor: version.minor })
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.where(and(eq(dataset.slug, slug), inArray(version.state, PUBLIC_STATES)))
		.orderBy(desc(version.major), desc(version.minor));
	return rows.map(({ major, minor }) => `${major}.${minor}`);
}

/** Every version that anybody may see, by name. */
export async function publishedRefs(): Promise<string[]> {
	const rows = await database()
		.select({ slug: dataset.slug, major: version.major, minor: version.minor })
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.where(inArray(version.state, PUBLIC_STATES))
		.orderBy(asc(dataset.slug), desc(version.major), desc(version.minor));
	return rows.map(({ slug, major, minor }) => `${slug}@${major}.${minor}`);
}
