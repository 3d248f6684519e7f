import { json } from '@sveltejs/kit';
import { spectrum } from '$lib/server/library/spectrum.ts';
import { answered } from '../../../../../answered.ts';
import type { RequestHandler } from './$types';

/** The sampled spectra of a version, for plots; a version never changes, so a browser may keep them. */
export const GET: RequestHandler = async ({ params }) => {
	const sampled = await answered(() => spectrum(`${params.slug}@${params.number}`));
	return json({ spectrum: sampled }, { headers: { 'cache-control': 'private, max-age=86400' } });
};
