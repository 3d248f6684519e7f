import { answering } from '$lib/server/api/problem.ts';
import { taggedJson } from '$lib/server/api/serialize/tagged.ts';
import { viewerOf } from '$lib/server/library/viewer.ts';
import * as versions from '$lib/server/library/versions.ts';
import type { RequestHandler } from './$types';

/** The MODEL alone, as `permittivity` of a request takes it. */
export const GET: RequestHandler = ({ request, params, locals }) =>
	answering(async () =>
		taggedJson(
			request,
			(await versions.get(params.slug, params.number, undefined, viewerOf(locals.principal))).model
		)
	);
