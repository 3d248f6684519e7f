import { answering } from '$lib/server/api/problem.ts';
import { taggedFile } from '$lib/server/api/serialize/tagged.ts';
import { tableCsv } from '$lib/server/library/downloads.ts';
import { viewerOf } from '$lib/server/library/viewer.ts';
import * as versions from '$lib/server/library/versions.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ request, params, url, locals }) =>
	answering(async () => {
		const version = await versions.get(params.slug, params.number, undefined, viewerOf(locals.principal));
		const text = await tableCsv(version, url.origin, undefined, viewerOf(locals.principal));
		return taggedFile(request, text, 'text/csv; charset=utf-8', `${version.ref}.csv`);
	});
