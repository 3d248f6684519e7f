import { personOf } from '$lib/server/auth/require.ts';
import { health } from '$lib/server/people/health.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals }) => ({
	lines: await health(personOf(locals.principal))
});
