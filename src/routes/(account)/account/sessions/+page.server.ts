import { fail, redirect } from '@sveltejs/kit';
import { sessionOf } from '$lib/server/auth/require.ts';
import { end, endOthers, list } from '$lib/server/auth/sessions.ts';
import { attempt, field } from '$lib/server/people/attempt.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals }) => {
	const { person, sessionId } = sessionOf(locals.principal);
	return { sessions: await list(person.id, sessionId) };
};

export const actions: Actions = {
	end: async ({ request, locals }) => {
		const form = await request.formData();
		const { person, sessionId } = sessionOf(locals.principal);
		const id = field(form, 'session');
		const done = await attempt(() => end(person.id, id));
		if (done.failed) return fail(done.status, done.refused);
		if (id === sessionId) redirect(303, '/sign-in');
		return { said: 'The session has ended.' };
	},

	others: async ({ locals }) => {
		const { person, sessionId } = sessionOf(locals.principal);
		const count = await endOthers(person.id, sessionId);
		return { said: count === 1 ? 'One other session has ended.' : `${count} other sessions have ended.` };
	}
};
