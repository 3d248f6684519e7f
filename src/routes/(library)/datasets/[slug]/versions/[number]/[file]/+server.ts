import { error, redirect } from '@sveltejs/kit';
import { dataCite, ris } from '$lib/server/library/citation-files.ts';
import * as versions from '$lib/server/library/versions.ts';
import { answered } from '../../../../../answered.ts';
import type { RequestHandler } from './$types';

/** Files of a version, with their real endings. The API hands out the first ones. */
const OF_THE_API = ['table.csv', 'model.json', 'raw', 'citation.bib'];
const FILES = [...OF_THE_API, 'citation.ris', 'datacite.json'];

export const GET: RequestHandler = async ({ params, url }) => {
	const { slug, number, file } = params;
	if (!FILES.includes(file))
		error(
			404,
			`A version has no file “${file}”. It has ${FILES.slice(0, -1).join(', ')} and ${FILES.at(-1)}.`
		);
	if (OF_THE_API.includes(file))
		redirect(
			302,
			`/api/v1/datasets/${encodeURIComponent(slug)}/versions/${encodeURIComponent(number)}/${file}`
		);
	const version = await answered(() => versions.get(slug, number));
	if (file === 'datacite.json') return Response.json(dataCite(version, url.origin));
	return new Response(ris(version, url.origin), {
		headers: { 'content-type': 'application/x-research-info-systems; charset=utf-8' }
	});
};
