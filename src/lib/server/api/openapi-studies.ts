import { z } from 'zod';
import type { ZodOpenApiPathsObject } from 'zod-openapi';
import { newStudy, savedStudy, studyChange, studyQuery } from '../../schemas/saved-study.ts';
import { freezeFields, recomputation, savedRecord } from '../../schemas/record.ts';
import { json, problems } from './openapi-answers.ts';

const study = z.object({ study: savedStudy });
const record = z.object({ record: savedRecord });
const byChecksum = {
	path: z.object({
		checksum: z.string().meta({ description: 'SHA-256 of the content, 64 hexadecimal digits' })
	})
};
const refusals = {
	400: problems.malformed,
	401: problems.unknown,
	403: problems.forbidden,
	413: problems.tooLarge,
	415: problems.wrongType,
	422: problems.invalid
};

export const studyPaths: ZodOpenApiPathsObject = {
	'/studies': {
		get: {
			summary: 'Studies that you may see: your own, your groups’, or those open to all',
			requestParams: { query: studyQuery.partial() },
			responses: {
				200: json(
					z.object({ studies: z.array(savedStudy), next: z.string().nullable() }),
					'A page of studies'
				),
				401: problems.unknown,
				422: problems.invalid
			}
		},
		post: {
			summary: 'Keeps a study: its address, a name, notes, who may see it',
			requestBody: { required: true, content: { 'application/json': { schema: newStudy } } },
			responses: { 201: json(study, 'The study'), ...refusals }
		}
	},
	'/studies/{id}': {
		get: {
			summary: 'One study',
			requestParams: { path: z.object({ id: z.uuid() }) },
			responses: { 200: json(study, 'The study'), 401: problems.unknown, 404: problems.absent }
		},
		patch: {
			summary: 'Saves what was changed since the revision that you saw',
			requestParams: { path: z.object({ id: z.uuid() }) },
			requestBody: { required: true, content: { 'application/json': { schema: studyChange } } },
			responses: {
				200: json(study, 'The study as it is now'),
				404: problems.absent,
				409: problems.state,
				...refusals
			}
		}
	},
	'/studies/{id}/freeze': {
		post: {
			summary: 'Freezes a study into a record that never changes; it is computed anew',
			requestParams: { path: z.object({ id: z.uuid() }) },
			requestBody: { required: true, content: { 'application/json': { schema: freezeFields } } },
			responses: {
				201: json(record, 'The record'),
				404: problems.absent,
				409: problems.state,
				429: problems.limited,
				...refusals
			}
		}
	},
	'/records/{checksum}': {
		get: {
			summary: 'A record: inputs, versions, engine, numbers with bounds, notes, authors',
			requestParams: byChecksum,
			responses: { 200: json(record, 'The record'), 404: problems.absent }
		}
	},
	'/records/{checksum}/recompute': {
		post: {
			summary: 'Computes a record again and says whether the numbers are identical, or what differs',
			requestParams: byChecksum,
			responses: {
				200: json(z.object({ recomputation }), 'What came out'),
				404: problems.absent,
				422: problems.invalid,
				429: problems.limited
			}
		}
	},
	'/records/{checksum}/archive.zip': {
		get: {
			summary: 'A record as one file that is of use without this installation',
			requestParams: byChecksum,
			responses: {
				200: {
					description: 'Inputs, models, tables, results, citations, recipe, checksums',
					content: { 'application/zip': { schema: z.string().meta({ format: 'binary' }) } }
				},
				404: problems.absent
			}
		}
	}
};
