import { personOf } from '$lib/server/auth/require.ts';
import * as reviewing from '$lib/server/library/reviewing.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals }) => ({
	waiting: await reviewing.queue(personOf(locals.principal))
});
