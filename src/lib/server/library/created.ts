import type { z } from 'zod';
import type { SignedIn } from '../../schemas/person.ts';
import { parseInput } from '../api/issues.ts';
import { answering } from '../api/problem.ts';
import type { Principal } from '../auth/principal.ts';
import { personOf } from '../auth/require.ts';
import { readJson } from '../limits/read-json.ts';
import { answerOnce } from './repeated-request.ts';

/** POST routes of the library that take JSON: read, checked, done once, answered. */

export interface PostEvent {
	request: Request;
	url: URL;
	locals: { principal: Principal };
}

const BODY_MAX = 256 * 1024;

function answerJson<Fields>(
	{ request, url, locals }: PostEvent,
	status: 200 | 201 | 202,
	shape: z.ZodType<Fields>,
	work: (actor: SignedIn, fields: Fields) => Promise<unknown>
): Promise<Response> {
	return answering(async () => {
		const actor = personOf(locals.principal);
		const content = await readJson(request, BODY_MAX);
		return answerOnce({ ...askedBy(request, url, actor), content }, async () =>
			Response.json(await work(actor, parseInput(shape, content)), {
				status,
				headers: { 'cache-control': 'no-store' }
			})
		);
	});
}

export const askedBy = (request: Request, url: URL, actor: SignedIn) => ({
	personId: actor.id,
	method: request.method,
	path: url.pathname,
	key: request.headers.get('idempotency-key')
});

/** Answers 201 with what was made. */
export const createdJson = <Fields>(
	event: PostEvent,
	shape: z.ZodType<Fields>,
	work: (actor: SignedIn, fields: Fields) => Promise<unknown>
): Promise<Response> => answerJson(event, 201, shape, work);

/** Answers 200 with what it has become. */
export const steppedJson = <Fields>(
	event: PostEvent,
	shape: z.ZodType<Fields>,
	work: (actor: SignedIn, fields: Fields) => Promise<unknown>
): Promise<Response> => answerJson(event, 200, shape, work);

/** Answers 202 with what was taken on and is not done yet. */
export const acceptedJson = <Fields>(
	event: PostEvent,
	shape: z.ZodType<Fields>,
	work: (actor: SignedIn, fields: Fields) => Promise<unknown>
): Promise<Response> => answerJson(event, 202, shape, work);
