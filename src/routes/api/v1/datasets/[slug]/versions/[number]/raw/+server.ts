import { answering } from '$lib/server/api/problem.ts';
import { taggedFile } from '$lib/server/api/serialize/tagged.ts';
import { viewerOf } from '$lib/server/library/viewer.ts';
import * as versions from '$lib/server/library/versions.ts';
import type { RequestHandler } from './$types';

/** The bytes as uploaded; never shown in place, whatever they claim to be. */
export const GET: RequestHandler = ({ request, params, locals }) =>
	answering(async () => {
		const { name, bytes } = await versions.rawFile(
			params.slug,
			params.number,
			undefined,
			viewerOf(locals.principal)
		);
		return taggedFile(request, new Uint8Array(bytes), 'application/octet-stream', name);
	});
