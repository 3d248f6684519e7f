import { z } from 'zod';
import { materialSlug } from './material.ts';
import { line } from './plain-text.ts';
import { versionSummary } from './version.ts';

/** One line of permittivity data for one material. */

export const datasetSlug = z
	.string()
	.max(100)
	.regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'lower-case letters, digits and single hyphens, as gold-lorentz-drude');

export const datasetFields = z.strictObject({
	slug: datasetSlug,
	title: line(200),
	material: materialSlug
});

/** Versions newest first; `latest` is the number of the newest published one. */
export const datasetWithVersions = z
	.object({
		slug: datasetSlug,
		title: z.string(),
		latest: z.string().nullable(),
		/** The one that the curators recommend, which need not be the newest; null: they have not said. */
		recommended: z.string().nullable(),
		versions: z.array(versionSummary)
	})
	.meta({ id: 'DatasetWithVersions' });

export type DatasetFields = z.infer<typeof datasetFields>;
export type DatasetWithVersions = z.infer<typeof datasetWithVersions>;
