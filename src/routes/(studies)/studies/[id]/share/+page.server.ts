import { fail, redirect } from '@sveltejs/kit';
import { z } from 'zod';
import { linkDays } from '$lib/schemas/saved-study.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import * as links from '$lib/server/studies/links.ts';
import * as studies from '$lib/server/studies/studies.ts';
import { heirs, transfer } from '$lib/server/studies/transfer.ts';
import { answered } from '../../../../(library)/answered.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) =>
	answered(async () => {
		const actor = personOf(locals.principal);
		const { study } = await studies.get(actor, params.id);
		return { study, links: await links.list(actor, params.id), heirs: await heirs(actor) };
	});

export const actions: Actions = {
	link: async ({ request, params, locals, url }) => {
		const days = field(await request.formData(), 'days');
		const done = await attempt(() =>
			links.create(
				personOf(locals.principal),
				params.id,
				parseForm(z.object({ days: linkDays }), { days }).days
			)
		);
		if (done.failed) return fail(done.status, { ...done.refused, days });
		return { address: `${url.origin}/shared/${done.value}` };
	},

	revoke: async ({ request, params, locals }) => {
		const link = field(await request.formData(), 'link');
		const done = await attempt(() => links.revoke(personOf(locals.principal), params.id, link));
		return done.failed ? fail(done.status, done.refused) : { said: 'The link is taken back.' };
	},

	give: async ({ request, params, locals }) => {
		const form = await request.formData();
		const done = await attempt(() =>
			transfer(personOf(locals.principal), params.id, {
				to: field(form, 'to'),
				revision: Number(field(form, 'revision'))
			})
		);
		if (done.failed) return fail(done.status, done.refused);
		redirect(303, '/studies');
	}
};
