import { z } from 'zod';
import type { ZodOpenApiPathsObject } from 'zod-openapi';
import { datasetSlug } from '../../schemas/dataset.ts';
import { materialDetail } from '../../schemas/material-detail.ts';
import { libraryQuery, materialSlug, materialSummary } from '../../schemas/material.ts';
import { permittivityModel } from '../../schemas/permittivity.ts';
import { versionDetail, versionNumber } from '../../schemas/version.ts';
import { json, problems, text } from './openapi-answers.ts';

const ofVersion = { path: z.object({ slug: datasetSlug, number: versionNumber }) };
const VERSION = '/datasets/{slug}/versions/{number}';

export const libraryPaths: ZodOpenApiPathsObject = {
	'/materials': {
		get: {
			summary: 'Materials of the library',
			requestParams: {
				query: libraryQuery.pick({ search: true, class: true, cursor: true, limit: true }).partial()
			},
			responses: {
				200: json(
					z.object({ materials: z.array(materialSummary), next: z.string().nullable() }),
					'A page of materials; `next` is the cursor of the following one'
				),
				422: problems.invalid
			}
		}
	},
	'/materials/{slug}': {
		get: {
			summary: 'A material with its datasets and versions',
			requestParams: { path: z.object({ slug: materialSlug }) },
			responses: { 200: json(z.object({ material: materialDetail }), 'The material'), 404: problems.absent }
		}
	},
	[VERSION]: {
		get: {
			summary: 'A version: state, quality, checksum, source, sample, checks, links',
			requestParams: ofVersion,
			responses: { 200: json(z.object({ version: versionDetail }), 'The version'), 404: problems.absent }
		}
	},
	[`${VERSION}/model.json`]: {
		get: {
			summary: 'The model that a request may hold in the place of the version',
			requestParams: ofVersion,
			responses: { 200: json(permittivityModel, 'The model'), 404: problems.absent }
		}
	},
	[`${VERSION}/table.csv`]: {
		get: {
			summary: 'The rows of the table with a units row and their origin',
			requestParams: ofVersion,
			responses: { 200: text('text/csv', 'The table'), 404: problems.absent }
		}
	},
	[`${VERSION}/raw`]: {
		get: {
			summary: 'The bytes as they were uploaded',
			requestParams: ofVersion,
			responses: { 200: text('application/octet-stream', 'The file'), 404: problems.absent }
		}
	},
	[`${VERSION}/citation.bib`]: {
		get: {
			summary: 'The sources as BibTeX',
			requestParams: ofVersion,
			responses: { 200: text('application/x-bibtex', 'The citation'), 404: problems.absent }
		}
	}
};
