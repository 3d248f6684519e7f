import { fail } from '@sveltejs/kit';
import { newGroup } from '$lib/schemas/group.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { close, create, list, reopen } from '$lib/server/people/groups.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals }) => ({
	groups: await list(personOf(locals.principal))
});

export const actions: Actions = {
	create: async ({ request, locals }) => {
		const form = await request.formData();
		const typed = { name: field(form, 'name'), slug: field(form, 'slug') };
		const done = await attempt(() => create(personOf(locals.principal), parseForm(newGroup, typed)));
		return done.failed
			? fail(done.status, { ...done.refused, ...typed })
			: { said: `The group ${typed.name} is made.` };
	},

	close: async ({ request, locals }) => {
		const form = await request.formData();
		const done = await attempt(() => close(personOf(locals.principal), field(form, 'group')));
		return done.failed
			? fail(done.status, { ...done.refused, name: '', slug: '' })
			: { said: 'The group is closed: nobody new comes in.' };
	},

	reopen: async ({ request, locals }) => {
		const form = await request.formData();
		const done = await attempt(() => reopen(personOf(locals.principal), field(form, 'group')));
		return done.failed
			? fail(done.status, { ...done.refused, name: '', slug: '' })
			: { said: 'The group is open again.' };
	}
};
