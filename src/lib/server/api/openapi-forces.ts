import { z } from 'zod';
import type { ZodOpenApiPathsObject } from 'zod-openapi';
import {
	equilibrium,
	errorAnswer,
	forceAnswer,
	forcePoint,
	warning,
	wholeAnalysis
} from '../../schemas/force-answer.ts';
import { forceRequest } from '../../schemas/force.ts';
import { resolvedVersion } from '../../schemas/version.ts';
import { json, problems } from './openapi-answers.ts';

const origin = {
	runtime: z.string().meta({ description: 'on the same runtime equal requests give the same bits' }),
	versions: z
		.array(
			resolvedVersion.pick({
				ref: true,
				checksum: true,
				state: true,
				quality: true,
				qualityReason: true,
				supersededBy: true
			})
		)
		.meta({ description: 'the pinned versions that the numbers rest on' }),
	separationsNm: z.array(z.number())
};

const result = forceAnswer.extend(origin).meta({ id: 'ForceResult' });

/** One line of the stream. */
export const forceLine = z
	.discriminatedUnion('type', [
		forceAnswer.pick({ engine: true, inputChecksum: true }).extend({ type: z.literal('start'), ...origin }),
		z.object({
			type: z.literal('points'),
			from: z.int(),
			indices: z.array(z.int()).meta({ description: 'into separationsNm; coarse to fine' }),
			points: z.array(forcePoint)
		}),
		z.object({
			type: z.literal('end'),
			equilibria: z.array(equilibrium),
			warnings: z.array(warning),
			...wholeAnalysis.shape
		}),
		errorAnswer.extend({ type: z.literal('error') })
	])
	.meta({ id: 'ForceLine' });

const health = z.object({ status: z.enum(['ok', 'down']), database: z.boolean(), engine: z.string() });

export const forcePaths: ZodOpenApiPathsObject = {
	'/forces': {
		post: {
			summary: 'Energy, pressure and force between two bodies, each with a bound on its error',
			description:
				'With `Accept: application/x-ndjson` the curve comes line by line while it is computed. Closing the connection ' +
				'stops the work.',
			requestBody: { required: true, content: { 'application/json': { schema: forceRequest } } },
			responses: {
				200: {
					description: 'The curve',
					content: {
						'application/json': { schema: result },
						'application/x-ndjson': { schema: forceLine }
					}
				},
				400: problems.malformed,
				413: problems.tooLarge,
				415: problems.wrongType,
				422: problems.invalid,
				429: problems.limited,
				503: problems.busy
			}
		}
	},
	'/health': {
		get: {
			summary: 'Whether the server and its database answer',
			responses: { 200: json(health, 'They do'), 503: json(health, 'The database does not') }
		}
	},
	'/openapi.json': {
		get: {
			summary: 'This description',
			responses: { 200: json(z.looseObject({ openapi: z.string() }), 'OpenAPI 3.1') }
		}
	}
};
