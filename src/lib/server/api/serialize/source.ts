import type { Source } from '../../../schemas/source.ts';

/** A source as it leaves the server. */
export const serializeSource = (source: Source) => ({
	slug: source.slug,
	title: source.title,
	authors: source.authors,
	year: source.year,
	kind: source.kind,
	container: source.container,
	volume: source.volume,
	pages: source.pages,
	doi: source.doi,
	url: source.url,
	licence: source.licence,
	note: source.note,
	citation: source.citation
});
