import { answering } from '$lib/server/api/problem.ts';
import { serializeMaterialDetail } from '$lib/server/api/serialize/material.ts';
import { taggedJson } from '$lib/server/api/serialize/tagged.ts';
import * as materials from '$lib/server/library/materials.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ request, params }) =>
	answering(async () =>
		taggedJson(request, { material: serializeMaterialDetail(await materials.get(params.slug)) })
	);
