import { fail, redirect } from '@sveltejs/kit';
import { newFromArrangement } from '$lib/schemas/group-defaults.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import * as groupDefaults from '$lib/server/studies/group-defaults.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, url }) => {
	const actor = personOf(locals.principal);
	const groups = actor.groups.map(({ slug, name }) => ({ slug, name }));
	const wanted = url.searchParams.get('group');
	const group = groups.find(({ slug }) => slug === (wanted ?? groups[0]?.slug)) ?? null;
	return { groups, group, defaults: group ? await groupDefaults.of(actor, group.slug) : null };
};

export const actions: Actions = {
	default: async ({ request, locals }) => {
		const form = await request.formData();
		const typed = {
			name: field(form, 'name'),
			begin: field(form, 'begin'),
			group: field(form, 'group'),
			conduction: field(form, 'conduction'),
			temperatureK: field(form, 'temperatureK')
		};
		const made = await attempt(() =>
			groupDefaults.begin(personOf(locals.principal), parseForm(newFromArrangement, typed))
		);
		if (made.failed) return fail(made.status, { ...made.refused, typed });
		redirect(303, `/studies/${made.value.id}`);
	}
};
