import { fail, redirect } from '@sveltejs/kit';
import { personOf } from '$lib/server/auth/require.ts';
import { clearSessionCookie } from '$lib/server/auth/set-cookie.ts';
import { deleteAccount } from '$lib/server/people/account.ts';
import { attempt, field } from '$lib/server/people/attempt.ts';
import type { Actions } from './$types';

export const actions: Actions = {
	delete: async ({ request, locals, cookies }) => {
		const person = personOf(locals.principal);
		const form = await request.formData();
		if (field(form, 'email').trim().toLowerCase() !== person.email) {
			return fail(422, { message: 'Type your own e-mail address to show that you mean this account.' });
		}
		const done = await attempt(() => deleteAccount(person));
		if (done.failed) return fail(done.status, { message: done.refused.message });
		clearSessionCookie(cookies);
		redirect(303, '/');
	}
};
