import { answering } from '$lib/server/api/problem.ts';
import { taggedFile } from '$lib/server/api/serialize/tagged.ts';
import { tableCsv } from '$lib/server/library/downloads.ts';
import * as versions from '$lib/server/library/versions.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ request, params, url }) =>
	answering(async () => {
		const version = await versions.get(params.slug, params.number);
		const text = await tableCsv(version, url.origin);
		return taggedFile(request, text, 'text/csv; charset=utf-8', `${version.ref}.csv`);
	});
