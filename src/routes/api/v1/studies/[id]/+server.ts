import { studyChange } from '$lib/schemas/saved-study.ts';
import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { steppedJson } from '$lib/server/library/created.ts';
import * as studies from '$lib/server/studies/studies.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ params, locals }) =>
	answering(async () => {
		const { study } = await studies.get(personOf(locals.principal), params.id);
		return Response.json({ study }, { headers: { 'cache-control': 'no-store' } });
	});

export const PATCH: RequestHandler = (event) =>
	steppedJson(event, studyChange, async (actor, fields) => ({
		study: await studies.change(actor, event.params.id, fields)
	}));
