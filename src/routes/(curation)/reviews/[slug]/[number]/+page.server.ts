import { fail, redirect } from '@sveltejs/kit';
import { approval, refusal } from '$lib/schemas/upload.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { approve, giveBack } from '$lib/server/library/curation.ts';
import * as reviewing from '$lib/server/library/reviewing.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { answered } from '../../../../(library)/answered.ts';
import { drawnAsIs } from '../../../../(library)/sampled.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params }) => {
	const actor = personOf(locals.principal);
	const candidate = await answered(() => reviewing.candidate(actor, params.slug, params.number));
	const { state } = candidate.version;
	if (state === 'draft') redirect(303, `/drafts/${params.slug}/${params.number}`);
	if (state !== 'in_review') redirect(303, `/datasets/${params.slug}/versions/${params.number}`);
	return { candidate, spectrum: drawnAsIs(candidate.version) };
};

const seenIn = (form: FormData) => ({
	checksum: field(form, 'checksum'),
	submittedAt: field(form, 'submittedAt') || undefined
});

export const actions: Actions = {
	approve: async ({ request, params, locals }) => {
		const form = await request.formData();
		const reason = field(form, 'reason').trim();
		const done = await attempt(() =>
			approve(
				personOf(locals.principal),
				params.slug,
				params.number,
				parseForm(approval, { ...seenIn(form), ...(reason ? { reason } : {}) })
			)
		);
		if (done.failed) return fail(done.status, { ...done.refused, reason });
		redirect(303, `/datasets/${params.slug}/versions/${params.number}`);
	},

	return: async ({ request, params, locals }) => {
		const form = await request.formData();
		const reason = field(form, 'reason').trim();
		const done = await attempt(() =>
			giveBack(
				personOf(locals.principal),
				params.slug,
				params.number,
				parseForm(refusal, { ...seenIn(form), reason })
			)
		);
		if (done.failed) return fail(done.status, { ...done.refused, reason });
		redirect(303, '/reviews');
	}
};
