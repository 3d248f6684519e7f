import { parseInput } from '$lib/server/api/issues.ts';
import { answering } from '$lib/server/api/problem.ts';
import { serializeMaterial } from '$lib/server/api/serialize/material.ts';
import { taggedJson } from '$lib/server/api/serialize/tagged.ts';
import * as materials from '$lib/server/library/materials.ts';
import { materialQuery } from '$lib/schemas/material.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ request, url }) =>
	answering(async () => {
		const found = await materials.list(parseInput(materialQuery, Object.fromEntries(url.searchParams)));
		return taggedJson(request, { materials: found.materials.map(serializeMaterial), next: found.next });
	});
