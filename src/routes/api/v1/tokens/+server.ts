import { newToken } from '$lib/schemas/token.ts';
import { parseInput } from '$lib/server/api/issues.ts';
import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { readJson } from '$lib/server/limits/read-json.ts';
import { create, list } from '$lib/server/people/tokens.ts';
import type { RequestHandler } from './$types';

const BODY_MAX = 4096;

export const GET: RequestHandler = ({ locals }) =>
	answering(async () => Response.json({ tokens: await list(personOf(locals.principal)), next: null }));

/** By a browser's session only: a token cannot make another one. */
export const POST: RequestHandler = ({ request, locals }) =>
	answering(async () => {
		const wanted = parseInput(newToken, await readJson(request, BODY_MAX));
		return Response.json(await create(personOf(locals.principal), wanted), { status: 201 });
	});
