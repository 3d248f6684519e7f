import { fail, redirect } from '@sveltejs/kit';
import { freezeFields } from '$lib/schemas/record.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { callerGone } from '$lib/server/limits/caller-gone.ts';
import { chargeComputing } from '$lib/server/limits/computing.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { freeze } from '$lib/server/records/freeze.ts';
import { ofStudy } from '$lib/server/records/records.ts';
import * as studies from '$lib/server/studies/studies.ts';
import { answered } from '../../../../(library)/answered.ts';
import { loadStudy } from '../../../load-study.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params }) => {
	const actor = personOf(locals.principal);
	const { study: saved, mayEdit } = await answered(() => studies.get(actor, params.id));
	const loaded = await loadStudy(new URLSearchParams(saved.query));
	const states = await studies.history(actor, params.id);
	return {
		...loaded,
		saved,
		mayEdit,
		/** The owner first, then whoever saved a state. */
		authors: [...new Set([saved.owner, ...states.map(({ by }) => by).reverse()])],
		records: await ofStudy(actor, params.id)
	};
};

const authorsIn = (text: string) =>
	text
		.split('\n')
		.map((author) => author.trim())
		.filter((author) => author !== '');

export const actions: Actions = {
	default: async ({ request, params, locals, url, getClientAddress, platform }) => {
		const form = await request.formData();
		const typed = { authors: field(form, 'authors'), visibility: field(form, 'visibility') };
		const { gone, forget } = callerGone(request, platform);
		const done = await attempt(() =>
			freeze(
				personOf(locals.principal),
				params.id,
				parseForm(freezeFields, {
					revision: Number(field(form, 'revision')),
					authors: authorsIn(typed.authors),
					visibility: typed.visibility
				}),
				{
					charge: (seconds) => chargeComputing(getClientAddress(), seconds),
					origin: url.origin,
					signal: gone
				}
			)
		).finally(forget);
		if (done.failed) return fail(done.status, { ...done.refused, typed });
		redirect(303, `/records/${done.value}`);
	}
};
