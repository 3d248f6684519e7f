import { submission } from '$lib/schemas/upload.ts';
import { steppedJson } from '$lib/server/library/created.ts';
import { submit } from '$lib/server/library/curation.ts';
import { serializedVersion } from '$lib/server/library/stepped-version.ts';
import type { RequestHandler } from './$types';

export const POST: RequestHandler = (event) =>
	steppedJson(event, submission, async (actor, fields) => {
		await submit(actor, event.params.slug, event.params.number, fields);
		return serializedVersion(event.params, actor);
	});
