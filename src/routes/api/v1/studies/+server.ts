import { newStudy, studyQuery } from '$lib/schemas/saved-study.ts';
import { parseInput } from '$lib/server/api/issues.ts';
import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { createdJson } from '$lib/server/library/created.ts';
import * as studies from '$lib/server/studies/studies.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ url, locals }) =>
	answering(async () => {
		const query = parseInput(studyQuery, Object.fromEntries(url.searchParams));
		const found = await studies.list(personOf(locals.principal), query);
		return Response.json(found, { headers: { 'cache-control': 'no-store' } });
	});

export const POST: RequestHandler = (event) =>
	createdJson(event, newStudy, async (actor, fields) => ({ study: await studies.create(actor, fields) }));
