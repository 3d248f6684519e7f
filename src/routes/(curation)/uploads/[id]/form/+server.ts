import { savedForm } from '$lib/schemas/upload.ts';
import { parseInput } from '$lib/server/api/issues.ts';
import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import * as uploads from '$lib/server/library/uploads.ts';
import { readJson } from '$lib/server/limits/read-json.ts';
import type { RequestHandler } from './$types';

const BODY_MAX = 1_000_000;

/** Saves the form as typed and answers what the file reads as with it. */
export const PUT: RequestHandler = ({ request, params, locals }) =>
	answering(async () => {
		const actor = personOf(locals.principal);
		const { revision, form } = parseInput(savedForm, await readJson(request, BODY_MAX));
		const saved = await uploads.save(actor, params.id, revision, form);
		const { preview } = await uploads.get(actor, params.id);
		return Response.json({ ...saved, preview }, { headers: { 'cache-control': 'no-store' } });
	});
