import { answering } from '$lib/server/api/problem.ts';
import { taggedFile } from '$lib/server/api/serialize/tagged.ts';
import * as versions from '$lib/server/library/versions.ts';
import type { RequestHandler } from './$types';

/** The bytes as uploaded; never shown in place, whatever they claim to be. */
export const GET: RequestHandler = ({ request, params }) =>
	answering(async () => {
		const { name, bytes } = await versions.rawFile(params.slug, params.number);
		return taggedFile(request, new Uint8Array(bytes), 'application/octet-stream', name);
	});
