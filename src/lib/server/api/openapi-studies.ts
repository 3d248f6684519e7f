import { z } from 'zod';
import type { ZodOpenApiPathsObject } from 'zod-openapi';
import { newStudy, savedStudy, studyChange, studyQuery } from '../../schemas/saved-study.ts';
import { json, problems } from './openapi-answers.ts';

const study = z.object({ study: savedStudy });
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
	}
};
