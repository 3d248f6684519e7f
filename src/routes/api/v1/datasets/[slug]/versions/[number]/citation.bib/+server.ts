import { answering } from '$lib/server/api/problem.ts';
import { taggedFile } from '$lib/server/api/serialize/tagged.ts';
import { bibtex } from '$lib/server/library/citation.ts';
import { viewerOf } from '$lib/server/library/viewer.ts';
import * as versions from '$lib/server/library/versions.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ request, params, url, locals }) =>
	answering(async () => {
		const version = await versions.get(params.slug, params.number, undefined, viewerOf(locals.principal));
		return taggedFile(
			request,
			bibtex(version, url.origin),
			'application/x-bibtex; charset=utf-8',
			`${version.ref}.bib`
		);
	});
