import { viewerOf } from '$lib/server/library/viewer.ts';
import { compare, comparisonQuery } from '$lib/server/library/comparison.ts';
import * as materials from '$lib/server/library/desk.ts';
import { attempt, parseForm } from '$lib/server/people/attempt.ts';
import { drawnAsIs } from '../../(library)/sampled.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ url, locals }) => {
	const typed = Object.fromEntries(url.searchParams);
	const refs = await materials.publishedRefs();
	if (!typed.a || !typed.b) return { typed, refs, comparison: null, spectra: null, refused: null };
	const found = await attempt(async () => {
		const comparison = await compare(parseForm(comparisonQuery, typed), viewerOf(locals.principal));
		return { comparison, spectra: [drawnAsIs(comparison.first), drawnAsIs(comparison.second)] as const };
	});
	if (found.failed) return { typed, refs, comparison: null, spectra: null, refused: found.refused };
	return { typed, refs, ...found.value, refused: null };
};
