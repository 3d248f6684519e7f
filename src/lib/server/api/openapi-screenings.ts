import { z } from 'zod';
import type { ZodOpenApiOperationObject, ZodOpenApiPathsObject } from 'zod-openapi';
import { newScreening, rowsQuery, screeningRow, screeningSummary } from '../../schemas/screening.ts';
import { json, problems } from './openapi-answers.ts';

const one = z.object({ screening: screeningSummary });
const byId = { path: z.object({ id: z.uuid() }) };

const step = (summary: string): ZodOpenApiOperationObject => ({
	summary,
	requestParams: byId,
	requestBody: { required: true, content: { 'application/json': { schema: z.strictObject({}) } } },
	responses: {
		200: json(one, 'The screening as it is now'),
		400: problems.malformed,
		401: problems.unknown,
		403: problems.forbidden,
		404: problems.absent,
		409: problems.state
	}
});

export const screeningPaths: ZodOpenApiPathsObject = {
	'/screenings': {
		get: {
			summary: 'Screenings that you may see',
			responses: {
				200: json(
					z.object({ screenings: z.array(screeningSummary), next: z.string().nullable() }),
					'A page of screenings'
				),
				401: problems.unknown,
				422: problems.invalid
			}
		},
		post: {
			summary: 'States a screening: it waits for a worker, and its results appear as they come',
			requestBody: { required: true, content: { 'application/json': { schema: newScreening } } },
			responses: {
				202: json(one, 'Taken on'),
				400: problems.malformed,
				401: problems.unknown,
				403: problems.forbidden,
				409: problems.state,
				422: problems.invalid
			}
		}
	},
	'/screenings/{id}': {
		get: {
			summary: 'State and progress',
			requestParams: byId,
			responses: { 200: json(one, 'The screening'), 401: problems.unknown, 404: problems.absent }
		}
	},
	'/screenings/{id}/cells': {
		get: {
			summary:
				'Ranked rows, as far as they are computed; `at` is the place of a separation, `from` and `count` a window',
			requestParams: { ...byId, query: rowsQuery.partial() },
			responses: {
				200: json(
					z.object({ cells: z.array(screeningRow), total: z.int(), next: z.string().nullable() }),
					'Rows; next is the `from` of the following window'
				),
				401: problems.unknown,
				404: problems.absent,
				422: problems.invalid
			}
		}
	},
	'/screenings/{id}/cancel': { post: step('Ends it for good; what is computed stays') },
	'/screenings/{id}/pause': { post: step('Stops it until it is resumed') },
	'/screenings/{id}/resume': { post: step('Goes on with what is left') }
};
