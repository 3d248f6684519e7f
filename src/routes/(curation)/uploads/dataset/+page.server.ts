import { fail } from '@sveltejs/kit';
import { datasetFields } from '$lib/schemas/dataset.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { addDataset } from '$lib/server/library/additions.ts';
import * as desk from '$lib/server/library/desk.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async () => ({ materials: (await desk.choices()).materials });

export const actions: Actions = {
	default: async ({ request, locals }) => {
		const form = await request.formData();
		const typed = {
			slug: field(form, 'slug'),
			title: field(form, 'title'),
			material: field(form, 'material')
		};
		const made = await attempt(async () => {
			const fields = parseForm(datasetFields, typed);
			await addDataset(personOf(locals.principal), fields);
			return fields;
		});
		if (made.failed) return fail(made.status, { ...made.refused, typed });
		return {
			said: `The dataset ${made.value.slug} is made; its first version comes from an upload.`,
			slug: made.value.slug
		};
	}
};
