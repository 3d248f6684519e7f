import { json } from '@sveltejs/kit';
import { answered } from '../../../../../answered.ts';
import { sampled } from '../../../../../sampled.ts';
import type { RequestHandler } from './$types';

/** The sampled spectra of a version, for plots; a version never changes, so a browser may keep them. */
export const GET: RequestHandler = async ({ params }) => {
	const spectrum = await answered(() => sampled(`${params.slug}@${params.number}`));
	return json({ spectrum }, { headers: { 'cache-control': 'private, max-age=86400' } });
};
