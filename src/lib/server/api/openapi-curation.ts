import { z } from 'zod';
import type { ZodOpenApiOperationObject, ZodOpenApiPathsObject } from 'zod-openapi';
import { datasetFields, datasetSlug } from '../../schemas/dataset.ts';
import { forceChange, studyImpact } from '../../schemas/impact.ts';
import { materialFields, materialSummary } from '../../schemas/material.ts';
import { permittivityModel } from '../../schemas/permittivity.ts';
import { source, sourceFields } from '../../schemas/source.ts';
import { approval, modelDescription, refusal, submission, tableDescription } from '../../schemas/upload.ts';
import { versionDetail, versionNumber } from '../../schemas/version.ts';
import { json, problems } from './openapi-answers.ts';

/** What curators and reviewers send: each may be sent again under the same `Idempotency-Key` and is done once. */

const onceKey = z.object({ 'idempotency-key': z.string().max(200).optional() });
const described = z.object({ version: versionDetail });

const refusals = {
	400: problems.malformed,
	401: problems.unknown,
	403: problems.forbidden,
	409: problems.state,
	413: problems.tooLarge,
	415: problems.wrongType,
	422: problems.invalid
};

function create(summary: string, fields: z.ZodType, made: z.ZodType): ZodOpenApiOperationObject {
	return {
		summary,
		requestParams: { header: onceKey },
		requestBody: { required: true, content: { 'application/json': { schema: fields } } },
		responses: { 201: json(made, 'What was made'), ...refusals }
	};
}

function step(summary: string, fields: z.ZodType): ZodOpenApiOperationObject {
	return {
		summary,
		requestParams: { path: z.object({ slug: datasetSlug, number: versionNumber }), header: onceKey },
		requestBody: { required: true, content: { 'application/json': { schema: fields } } },
		responses: {
			200: json(described, 'What the version has become'),
			404: problems.absent,
			...refusals
		}
	};
}

const madeDataset = z.object({
	dataset: datasetFields.extend({
		latest: z.null(),
		links: z.object({ material: z.string(), versions: z.string() })
	})
});

const VERSION = '/datasets/{slug}/versions/{number}';

const posts: Record<string, ZodOpenApiOperationObject> = {
	'/materials': create('A new material', materialFields, z.object({ material: materialSummary })),
	'/sources': create('A new source', sourceFields, z.object({ source })),
	'/datasets': create('A new dataset of a material', datasetFields, madeDataset),
	'/datasets/{slug}/versions': {
		summary: 'A draft, from a file with its description or from a model with its description',
		requestParams: { path: z.object({ slug: datasetSlug }), header: onceKey },
		requestBody: {
			required: true,
			content: {
				'multipart/form-data': {
					schema: z.object({
						file: z.string().meta({ format: 'binary', description: 'The table as it came, at most 5 MB' }),
						description: tableDescription
					})
				},
				'application/json': { schema: z.object({ model: permittivityModel, description: modelDescription }) }
			}
		},
		responses: {
			201: json(described, 'The draft with its checks'),
			404: problems.absent,
			...refusals,
			415: problems.notText
		}
	},
	[`${VERSION}/submit`]: step('Hands a draft in for review', submission),
	[`${VERSION}/approve`]: step('Publishes what the reviewer saw', approval),
	[`${VERSION}/return`]: step('Sends a version back to its maker with a reason', refusal),
	[`${VERSION}/withdraw`]: step('Takes a published version out of use, with a reason', refusal)
};

const impact = z.object({
	impact: z.object({ arrangements: z.array(forceChange), studies: z.array(studyImpact) })
});

const impactPath: ZodOpenApiOperationObject = {
	summary:
		'What publishing a version would do to usual arrangements and to the studies that rest on its dataset',
	requestParams: { path: z.object({ slug: datasetSlug, number: versionNumber }) },
	responses: {
		200: json(impact, 'The largest changes first; a study that is not shared with you has no name'),
		401: problems.unknown,
		403: problems.forbidden,
		404: problems.absent
	}
};

/** The paths of the library with what may be sent to them. */
export function withCuration(library: ZodOpenApiPathsObject): ZodOpenApiPathsObject {
	const paths = { ...library };
	for (const [path, post] of Object.entries(posts)) paths[path] = { ...paths[path], post };
	paths[`${VERSION}/impact`] = { get: impactPath };
	return paths;
}
