import { fail, redirect } from '@sveltejs/kit';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field } from '$lib/server/people/attempt.ts';
import * as studies from '$lib/server/studies/studies.ts';
import { answered } from '../../../../(library)/answered.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) =>
	answered(async () => {
		const actor = personOf(locals.principal);
		const { study, mayEdit } = await studies.get(actor, params.id);
		return { study, mayEdit, states: await studies.history(actor, params.id) };
	});

export const actions: Actions = {
	restore: async ({ request, params, locals }) => {
		const form = await request.formData();
		const done = await attempt(() =>
			studies.restore(personOf(locals.principal), params.id, {
				from: Number(field(form, 'from')),
				revision: Number(field(form, 'revision'))
			})
		);
		if (done.failed) return fail(done.status, done.refused);
		redirect(303, `/studies/${params.id}`);
	}
};
