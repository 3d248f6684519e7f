import { studyChange } from '$lib/schemas/saved-study.ts';
import { parseInput } from '$lib/server/api/issues.ts';
import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { readJson } from '$lib/server/limits/read-json.ts';
import * as studies from '$lib/server/studies/studies.ts';
import type { RequestHandler } from './$types';

/** Saves the state that the page is in. */
export const PUT: RequestHandler = ({ request, params, locals }) =>
	answering(async () => {
		const wanted = parseInput(
			studyChange.pick({ revision: true, query: true }),
			await readJson(request, 64 * 1024)
		);
		const { revision, savedAt } = await studies.change(personOf(locals.principal), params.id, wanted);
		return Response.json({ revision, savedAt }, { headers: { 'cache-control': 'no-store' } });
	});
