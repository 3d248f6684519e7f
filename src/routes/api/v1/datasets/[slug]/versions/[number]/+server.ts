import { answering } from '$lib/server/api/problem.ts';
import { taggedJson } from '$lib/server/api/serialize/tagged.ts';
import { serializeVersion } from '$lib/server/api/serialize/version.ts';
import * as versions from '$lib/server/library/versions.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ request, params }) =>
	answering(async () =>
		taggedJson(request, { version: serializeVersion(await versions.get(params.slug, params.number)) })
	);
