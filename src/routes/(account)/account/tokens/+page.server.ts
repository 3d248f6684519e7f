import { fail } from '@sveltejs/kit';
import { newToken, SCOPES, TOKEN_DAYS_MAX } from '$lib/schemas/token.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { create, list, revokeOwn } from '$lib/server/people/tokens.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals }) => ({
	tokens: await list(personOf(locals.principal)),
	scopes: SCOPES,
	daysMax: TOKEN_DAYS_MAX
});

export const actions: Actions = {
	create: async ({ request, locals }) => {
		const form = await request.formData();
		const typed = { name: field(form, 'name'), days: field(form, 'days') };
		const made = await attempt(() =>
			create(
				personOf(locals.principal),
				parseForm(newToken, { ...typed, scopes: form.getAll('scopes').filter((value) => value !== '') })
			)
		);
		if (made.failed) return fail(made.status, { ...made.refused, ...typed });
		return { secret: made.value.secret, name: made.value.token.name };
	},

	revoke: async ({ request, locals }) => {
		const form = await request.formData();
		const done = await attempt(() => revokeOwn(personOf(locals.principal), field(form, 'token')));
		return done.failed
			? fail(done.status, { ...done.refused, name: '', days: '' })
			: { said: 'The token is revoked.' };
	}
};
