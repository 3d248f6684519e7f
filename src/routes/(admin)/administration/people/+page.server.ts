import { error } from '@sveltejs/kit';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt } from '$lib/server/people/attempt.ts';
import { list } from '$lib/server/people/people.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, url }) => {
	const search = url.searchParams.get('search') ?? '';
	const cursor = url.searchParams.get('cursor') ?? undefined;
	const found = await attempt(() => list(personOf(locals.principal), { search, cursor }));
	if (found.failed) error(found.status, found.refused.message);
	return { search, ...found.value };
};
