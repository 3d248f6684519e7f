import { personOf } from '$lib/server/auth/require.ts';
import * as screenings from '$lib/server/screening/screenings.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, url }) => {
	// An address that cannot be followed shows the list as it is without it.
	const asked = screenings.screeningQuery.safeParse(Object.fromEntries(url.searchParams)).data;
	const view = asked ?? screenings.screeningQuery.parse({});
	return { ...(await screenings.list(personOf(locals.principal), view)), view };
};
