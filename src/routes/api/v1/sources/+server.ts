import { sourceFields } from '$lib/schemas/source.ts';
import { createdJson } from '$lib/server/library/created.ts';
import { addSource } from '$lib/server/library/additions.ts';
import { shortCitation } from '$lib/server/library/citation.ts';
import { serializeSource } from '$lib/server/api/serialize/source.ts';
import type { RequestHandler } from './$types';

export const POST: RequestHandler = (event) =>
	createdJson(event, sourceFields, async (actor, fields) => {
		await addSource(actor, fields);
		return { source: serializeSource({ ...fields, citation: shortCitation(fields) }) };
	});
