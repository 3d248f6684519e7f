import { error, fail, redirect } from '@sveltejs/kit';
import { submission } from '$lib/schemas/upload.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { answer, submit } from '$lib/server/library/curation.ts';
import * as reviewing from '$lib/server/library/reviewing.ts';
import * as uploads from '$lib/server/library/uploads.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { answered } from '../../../../(library)/answered.ts';
import { drawnAsIs } from '../../../../(library)/sampled.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params }) => {
	const actor = personOf(locals.principal);
	const candidate = await answered(() => reviewing.candidate(actor, params.slug, params.number));
	const { state } = candidate.version;
	if (state === 'in_review') redirect(303, `/reviews/${params.slug}/${params.number}`);
	if (state !== 'draft') redirect(303, `/datasets/${params.slug}/versions/${params.number}`);
	if (!candidate.own) error(404, `There is no version ${params.number} of a dataset "${params.slug}".`);
	return {
		candidate,
		spectrum: drawnAsIs(candidate.version),
		upload: await uploads.ofVersion(actor, candidate.version.ref)
	};
};

const PREFIX = 'answer.';

/** Answers to warnings as typed; an empty one is none yet. */
function answersIn(form: FormData): Record<string, string> {
	return Object.fromEntries(
		[...form.keys()]
			.filter((name) => name.startsWith(PREFIX))
			.map((name) => [name.slice(PREFIX.length), field(form, name).trim()])
			.filter(([, text]) => text !== '')
	);
}

export const actions: Actions = {
	keep: async ({ request, params, locals }) => {
		const answers = answersIn(await request.formData());
		const kept = await attempt(() => answer(personOf(locals.principal), params.slug, params.number, answers));
		return kept.failed ? fail(kept.status, { ...kept.refused, answers }) : { said: 'The answers are kept.' };
	},

	submit: async ({ request, params, locals }) => {
		const form = await request.formData();
		const answers = answersIn(form);
		const done = await attempt(() =>
			submit(
				personOf(locals.principal),
				params.slug,
				params.number,
				parseForm(submission, { checksum: field(form, 'checksum'), answers })
			)
		);
		if (done.failed) return fail(done.status, { ...done.refused, answers });
		redirect(303, `/reviews/${params.slug}/${params.number}`);
	}
};
