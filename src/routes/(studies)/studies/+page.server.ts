import { fail, redirect } from '@sveltejs/kit';
import { newStudy, studyQuery } from '$lib/schemas/saved-study.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import * as studies from '$lib/server/studies/studies.ts';
import { glyphOf } from './glyph.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, url }) => {
	const actor = personOf(locals.principal);
	// An address that cannot be followed shows the list as it is without it.
	const view = studyQuery.safeParse(Object.fromEntries(url.searchParams)).data ?? studyQuery.parse({});
	const found = await studies.list(actor, view);
	return {
		view,
		groups: actor.groups.map(({ name }) => name),
		next: found.next,
		studies: found.studies.map((study) => ({ ...study, glyph: glyphOf(study.query) }))
	};
};

export const actions: Actions = {
	create: async ({ request, locals }) => {
		const form = await request.formData();
		const made = await attempt(() =>
			studies.create(
				personOf(locals.principal),
				parseForm(newStudy, { name: field(form, 'name'), query: field(form, 'query') || '?' })
			)
		);
		if (made.failed) return fail(made.status, { ...made.refused, query: field(form, 'query') });
		redirect(303, `/studies/${made.value.id}`);
	}
};
