import { error, fail } from '@sveltejs/kit';
import { z } from 'zod';
import { groupDefaults as defaultsForm } from '$lib/schemas/group-defaults.ts';
import { groupName } from '$lib/schemas/group.ts';
import { newInvitation } from '$lib/schemas/invitation.ts';
import type { SignedIn } from '$lib/schemas/person.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field, parseForm, type Attempt } from '$lib/server/people/attempt.ts';
import * as groups from '$lib/server/people/groups.ts';
import * as invitations from '$lib/server/people/invitations.ts';
import * as groupDefaults from '$lib/server/studies/group-defaults.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params }) => {
	const actor = personOf(locals.principal);
	const found = await attempt(() => groups.get(actor, params.slug));
	if (found.failed) error(found.status, found.refused.message);
	const group = found.value;
	const open = group.managed ? await invitations.list(actor, { groupId: group.id }) : { invitations: [] };
	return {
		group,
		self: actor.id,
		defaults: await groupDefaults.of(actor, params.slug),
		invitations: open.invitations.filter(({ state }) => state === 'open')
	};
};

const nameForm = z.object({ name: groupName });

/** The group is found again at each action, so that what its slug names is what the form changes. */
async function inGroup<T>(
	actor: SignedIn,
	slug: string,
	work: (groupId: string) => Promise<T>
): Promise<Attempt<T>> {
	return attempt(async () => work((await groups.get(actor, slug)).id));
}

export const actions: Actions = {
	rename: async ({ request, locals, params }) => {
		const form = await request.formData();
		const actor = personOf(locals.principal);
		const done = await inGroup(actor, params.slug, (id) =>
			groups.rename(actor, id, parseForm(nameForm, { name: field(form, 'name') }).name)
		);
		return done.failed ? fail(done.status, done.refused) : { said: 'The group has its new name.' };
	},

	defaults: async ({ request, locals, params }) => {
		const form = await request.formData();
		const typed = {
			conduction: field(form, 'conduction'),
			gold: field(form, 'gold').trim(),
			temperatureK: field(form, 'temperatureK')
		};
		const done = await attempt(() =>
			groupDefaults.set(
				personOf(locals.principal),
				params.slug,
				parseForm(defaultsForm, { ...typed, gold: typed.gold === '' ? null : typed.gold })
			)
		);
		return done.failed
			? fail(done.status, { ...done.refused, typed })
			: { said: 'New studies of the group begin with that.' };
	},

	invite: async ({ request, locals, params }) => {
		const form = await request.formData();
		const actor = personOf(locals.principal);
		const email = field(form, 'email');
		const done = await inGroup(actor, params.slug, (groupId) =>
			invitations.invite(actor, parseForm(newInvitation, { email, role: field(form, 'role'), groupId }))
		);
		return done.failed
			? fail(done.status, { ...done.refused, email })
			: { said: `The invitation to ${email} is on its way.` };
	},

	revoke: async ({ request, locals, params }) => {
		const form = await request.formData();
		const actor = personOf(locals.principal);
		const done = await inGroup(actor, params.slug, () =>
			invitations.revoke(actor, field(form, 'invitation'))
		);
		return done.failed ? fail(done.status, done.refused) : { said: 'The invitation is taken back.' };
	},

	lead: async ({ request, locals, params }) => {
		const form = await request.formData();
		const actor = personOf(locals.principal);
		const lead = field(form, 'lead') === 'yes';
		const done = await inGroup(actor, params.slug, (groupId) =>
			groups.setLead(actor, { groupId, personId: field(form, 'person'), lead })
		);
		return done.failed
			? fail(done.status, done.refused)
			: { said: lead ? 'That member leads now too.' : 'That member leads no longer.' };
	},

	remove: async ({ request, locals, params }) => {
		const form = await request.formData();
		const actor = personOf(locals.principal);
		const done = await inGroup(actor, params.slug, (groupId) =>
			groups.remove(actor, groupId, field(form, 'person'))
		);
		return done.failed ? fail(done.status, done.refused) : { said: 'That person is out of the group.' };
	}
};
