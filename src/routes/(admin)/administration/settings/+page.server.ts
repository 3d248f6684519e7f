import { fail } from '@sveltejs/kit';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt } from '$lib/server/people/attempt.ts';
import { change, read } from '$lib/server/people/installation.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async () => ({ settings: await read() });

export const actions: Actions = {
	default: async ({ request, locals }) => {
		const form = await request.formData();
		const done = await attempt(() =>
			change(personOf(locals.principal), { publicReading: form.has('publicReading') })
		);
		return done.failed ? fail(done.status, done.refused) : { said: 'The settings are saved.' };
	}
};
