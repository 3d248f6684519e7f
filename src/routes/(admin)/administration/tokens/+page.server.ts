import { error, fail } from '@sveltejs/kit';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field } from '$lib/server/people/attempt.ts';
import { listAll, revokeAnybodys } from '$lib/server/people/tokens.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, url }) => {
	const cursor = url.searchParams.get('cursor') ?? undefined;
	const found = await attempt(() => listAll(personOf(locals.principal), { cursor }));
	if (found.failed) error(found.status, found.refused.message);
	return found.value;
};

export const actions: Actions = {
	revoke: async ({ request, locals }) => {
		const form = await request.formData();
		const done = await attempt(() => revokeAnybodys(personOf(locals.principal), field(form, 'token')));
		return done.failed ? fail(done.status, done.refused) : { said: 'The token is revoked.' };
	}
};
