import { fail, redirect } from '@sveltejs/kit';
import { personOf } from '$lib/server/auth/require.ts';
import { fileName } from '$lib/server/library/posted-version.ts';
import { UPLOAD_BYTES_MAX } from '$lib/server/library/upload/decode.ts';
import * as uploads from '$lib/server/library/uploads.ts';
import { InvalidInput } from '$lib/server/errors.ts';
import { attempt, field } from '$lib/server/people/attempt.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, url }) => ({
	uploads: await uploads.list(personOf(locals.principal)),
	dataset: url.searchParams.get('dataset') ?? ''
});

/** The file if one was chosen, else what was pasted. */
function contentOf(form: FormData) {
	const file = form.get('file');
	if (file instanceof File && file.size > 0) {
		if (file.size > UPLOAD_BYTES_MAX)
			throw new InvalidInput(`A file may have at most ${UPLOAD_BYTES_MAX.toLocaleString('en')} bytes.`, [
				{ path: 'file', message: 'cut it down, or leave out what is not measured' }
			]);
		return file.arrayBuffer().then((bytes) => ({ name: fileName(file.name), bytes: Buffer.from(bytes) }));
	}
	const pasted = field(form, 'pasted');
	if (pasted.trim() === '')
		throw new InvalidInput('There is nothing to read yet.', [
			{ path: 'file', message: 'choose a file, or paste rows below' }
		]);
	return Promise.resolve({ name: 'pasted.txt', bytes: Buffer.from(pasted, 'utf8') });
}

export const actions: Actions = {
	file: async ({ request, locals }) => {
		const form = await request.formData();
		const dataset = field(form, 'dataset');
		const made = await attempt(async () =>
			uploads.start(
				personOf(locals.principal),
				{ raw: await contentOf(form) },
				dataset === '' ? {} : { dataset }
			)
		);
		if (made.failed) return fail(made.status, { ...made.refused, pasted: field(form, 'pasted') });
		redirect(303, `/uploads/${made.value}`);
	},

	model: async ({ request, locals }) => {
		const form = await request.formData();
		const dataset = field(form, 'dataset');
		const made = await attempt(() =>
			uploads.start(personOf(locals.principal), { form: dataset === '' ? {} : { dataset } })
		);
		if (made.failed) return fail(made.status, { ...made.refused, pasted: '' });
		redirect(303, `/uploads/${made.value}`);
	},

	remove: async ({ request, locals }) => {
		const form = await request.formData();
		const done = await attempt(() => uploads.remove(personOf(locals.principal), field(form, 'upload')));
		return done.failed
			? fail(done.status, { ...done.refused, pasted: '' })
			: { said: 'The upload is removed. A draft that was made of it stays.' };
	},

	from: async ({ request, locals }) => {
		const form = await request.formData();
		const made = await attempt(() =>
			uploads.startFrom(personOf(locals.principal), field(form, 'slug'), field(form, 'number'))
		);
		if (made.failed) return fail(made.status, { ...made.refused, pasted: '' });
		redirect(303, `/uploads/${made.value}`);
	}
};
