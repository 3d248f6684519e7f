import { error, fail } from '@sveltejs/kit';
import { newInvitation } from '$lib/schemas/invitation.ts';
import { ROLES } from '$lib/schemas/person.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { open } from '$lib/server/people/groups.ts';
import { invite, list, revoke } from '$lib/server/people/invitations.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, url }) => {
	const cursor = url.searchParams.get('cursor') ?? undefined;
	const found = await attempt(() => list(personOf(locals.principal), { cursor }));
	if (found.failed) error(found.status, found.refused.message);
	return { ...found.value, groups: await open(), roles: ROLES };
};

export const actions: Actions = {
	invite: async ({ request, locals }) => {
		const form = await request.formData();
		const email = field(form, 'email');
		const done = await attempt(() =>
			invite(
				personOf(locals.principal),
				parseForm(newInvitation, {
					email,
					role: field(form, 'role'),
					groupId: field(form, 'group') || null,
					lead: form.has('lead')
				})
			)
		);
		return done.failed
			? fail(done.status, { ...done.refused, email })
			: { said: `The invitation to ${email} is on its way.` };
	},

	revoke: async ({ request, locals }) => {
		const form = await request.formData();
		const done = await attempt(() => revoke(personOf(locals.principal), field(form, 'invitation')));
		return done.failed
			? fail(done.status, { ...done.refused, email: '' })
			: { said: 'The invitation is taken back.' };
	}
};
