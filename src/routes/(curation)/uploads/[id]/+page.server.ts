import { fail, redirect } from '@sveltejs/kit';
import { personOf } from '$lib/server/auth/require.ts';
import * as desk from '$lib/server/library/desk.ts';
import * as uploads from '$lib/server/library/uploads.ts';
import { attempt, parseForm } from '$lib/server/people/attempt.ts';
import { savedForm } from '$lib/schemas/upload.ts';
import { answered } from '../../../(library)/answered.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params }) => {
	const actor = personOf(locals.principal);
	const upload = await answered(() => uploads.get(actor, params.id));
	return { upload, choices: await desk.choices(), versions: await desk.publishedNumbers(upload.dataset) };
};

/** Without script the whole form comes with each press of a button. */
async function keep(request: Request, id: string, actor: ReturnType<typeof personOf>) {
	const form = await request.formData();
	const fields = Object.fromEntries(
		[...form].flatMap(([name, value]) => (typeof value === 'string' ? [[name, value]] : []))
	);
	const { revision, ...typed } = fields;
	return attempt(async () => {
		const saved = parseForm(savedForm, { revision: Number(revision), form: typed });
		return uploads.save(actor, id, saved.revision, saved.form);
	});
}

export const actions: Actions = {
	save: async ({ request, params, locals }) => {
		const kept = await keep(request, params.id, personOf(locals.principal));
		return kept.failed ? fail(kept.status, kept.refused) : { said: 'Saved as typed.' };
	},

	draft: async ({ request, params, locals }) => {
		const actor = personOf(locals.principal);
		const kept = await keep(request, params.id, actor);
		if (kept.failed) return fail(kept.status, kept.refused);
		const made = await attempt(() => uploads.makeDraft(actor, params.id));
		if (made.failed) return fail(made.status, made.refused);
		redirect(303, `/drafts/${made.value.slug}/${made.value.number}`);
	}
};
