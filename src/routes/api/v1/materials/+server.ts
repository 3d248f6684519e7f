import { parseInput } from '$lib/server/api/issues.ts';
import { answering } from '$lib/server/api/problem.ts';
import { serializeMaterial } from '$lib/server/api/serialize/material.ts';
import { taggedJson } from '$lib/server/api/serialize/tagged.ts';
import { addMaterial } from '$lib/server/library/additions.ts';
import { createdJson } from '$lib/server/library/created.ts';
import * as materials from '$lib/server/library/materials.ts';
import { materialFields, materialQuery } from '$lib/schemas/material.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ request, url }) =>
	answering(async () => {
		const found = await materials.list(parseInput(materialQuery, Object.fromEntries(url.searchParams)));
		return taggedJson(request, { materials: found.materials.map(serializeMaterial), next: found.next });
	});

export const POST: RequestHandler = (event) =>
	createdJson(event, materialFields, async (actor, fields) => {
		await addMaterial(actor, fields);
		return { material: serializeMaterial({ ...fields, datasetCount: 0, versionCount: 0 }) };
	});
