import { error, fail } from '@sveltejs/kit';
import { z } from 'zod';
import { role, ROLES } from '$lib/schemas/person.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { add, open } from '$lib/server/people/groups.ts';
import { get, readmit, removePerson, setRole } from '$lib/server/people/people.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params }) => {
	const actor = personOf(locals.principal);
	const found = await attempt(() => get(actor, params.id));
	if (found.failed) error(found.status, found.refused.message);
	return { person: found.value, roles: ROLES, groups: await open(), self: actor.id === params.id };
};

const roleForm = z.object({ role });

export const actions: Actions = {
	role: async ({ request, locals, params }) => {
		const form = await request.formData();
		const done = await attempt(async () => {
			const wanted = parseForm(roleForm, { role: field(form, 'role') });
			await setRole(personOf(locals.principal), params.id, wanted.role);
			return wanted.role;
		});
		return done.failed
			? fail(done.status, done.refused)
			: { said: `The role is now ${done.value}. The person has to sign in again.` };
	},

	remove: async ({ locals, params }) => {
		const done = await attempt(() => removePerson(personOf(locals.principal), params.id));
		return done.failed
			? fail(done.status, done.refused)
			: { said: 'Access is ended: sessions and tokens count no more.' };
	},

	readmit: async ({ locals, params }) => {
		const done = await attempt(() => readmit(personOf(locals.principal), params.id));
		return done.failed ? fail(done.status, done.refused) : { said: 'The person may sign in again.' };
	},

	group: async ({ request, locals, params }) => {
		const form = await request.formData();
		const done = await attempt(() =>
			add(personOf(locals.principal), {
				groupId: field(form, 'group'),
				personId: params.id,
				lead: form.has('lead')
			})
		);
		return done.failed ? fail(done.status, done.refused) : { said: 'The person is in the group.' };
	}
};
