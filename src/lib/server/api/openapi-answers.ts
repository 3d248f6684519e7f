import { z } from 'zod';
import type { ZodOpenApiResponseObject } from 'zod-openapi';
import { errorAnswer } from '../../schemas/force-answer.ts';

/** Answers that many routes share. */

export function json(schema: z.ZodType, description: string): ZodOpenApiResponseObject {
	return { description, content: { 'application/json': { schema } } };
}

export function text(type: string, description: string): ZodOpenApiResponseObject {
	return { description, content: { [type]: { schema: z.string() } } };
}

const problem = (description: string) => json(errorAnswer, description);

export const problems = {
	malformed: problem('The body is not JSON.'),
	unknown: problem('The credentials are missing, wrong or no longer good.'),
	forbidden: problem('Your role, or the scope of the token, does not allow this.'),
	state: problem('The state of the thing does not allow this now.'),
	absent: problem('There is no such thing, or it is hidden from you.'),
	tooLarge: problem('The body is larger than accepted.'),
	notText: problem('The file is not text.'),
	wrongType: problem('The body is not sent as JSON.'),
	invalid: problem('The content is wrong; each issue names a field and says what would be right.'),
	limited: {
		...problem("The caller's share of computing time is used up; Retry-After says when to try again."),
		headers: z.object({ 'retry-after': z.string() })
	},
	busy: problem('Too many computations are waiting, or the database does not answer.')
};
