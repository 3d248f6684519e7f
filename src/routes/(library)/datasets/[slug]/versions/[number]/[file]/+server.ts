import { error, redirect } from '@sveltejs/kit';
import type { RequestHandler } from './$types';

/** Files of a version, with their real endings; the API hands them out. */
const FILES = ['table.csv', 'model.json', 'raw', 'citation.bib'];

export const GET: RequestHandler = ({ params }) => {
	const { slug, number, file } = params;
	if (!FILES.includes(file))
		error(
			404,
			`A version has no file “${file}”. It has ${FILES.slice(0, -1).join(', ')} and ${FILES.at(-1)}.`
		);
	redirect(
		302,
		`/api/v1/datasets/${encodeURIComponent(slug)}/versions/${encodeURIComponent(number)}/${file}`
	);
};
