import { recordQuery } from '$lib/schemas/record.ts';
import { readerOf } from '$lib/server/records/access.ts';
import * as records from '$lib/server/records/records.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, url }) => {
	const reader = readerOf(locals.principal);
	// An address that cannot be followed shows the list as it is without it.
	const view = recordQuery.safeParse(Object.fromEntries(url.searchParams)).data ?? recordQuery.parse({});
	return { ...(await records.list(reader, view)), view, signedIn: reader !== null };
};
