import { z } from 'zod';
import type { ZodOpenApiPathsObject } from 'zod-openapi';
import { newToken, tokenSummary } from '../../schemas/token.ts';
import { json, problems } from './openapi-answers.ts';

export const peoplePaths: ZodOpenApiPathsObject = {
	'/tokens': {
		get: {
			summary: 'Your own tokens, without their secrets',
			responses: {
				200: json(z.object({ tokens: z.array(tokenSummary), next: z.null() }), 'The tokens, newest first'),
				401: problems.unknown,
				403: problems.forbidden
			}
		},
		post: {
			summary: 'A new personal token; its secret is shown this once',
			description: 'Only in a session of a browser: a token cannot make another one.',
			requestBody: { required: true, content: { 'application/json': { schema: newToken } } },
			responses: {
				201: json(z.object({ token: tokenSummary, secret: z.string() }), 'The token and its secret'),
				400: problems.malformed,
				401: problems.unknown,
				403: problems.forbidden,
				409: problems.state,
				413: problems.tooLarge,
				415: problems.wrongType,
				422: problems.invalid
			}
		}
	},
	'/tokens/{id}': {
		delete: {
			summary: 'Revokes a token of your own',
			requestParams: { path: z.object({ id: z.uuid() }) },
			responses: {
				204: { description: 'It works no more' },
				401: problems.unknown,
				403: problems.forbidden,
				404: problems.absent
			}
		}
	}
};
