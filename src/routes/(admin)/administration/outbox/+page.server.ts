import { error, fail } from '@sveltejs/kit';
import { z } from 'zod';
import { personOf } from '$lib/server/auth/require.ts';
import { OUTBOX_STATE_WORDS, list, tryNow } from '$lib/server/outbox/list.ts';
import { attempt, field } from '$lib/server/people/attempt.ts';
import type { Actions, PageServerLoad } from './$types';

const stateShape = z.enum(OUTBOX_STATE_WORDS).optional();

export const load: PageServerLoad = async ({ url }) => {
	const state = stateShape.safeParse(url.searchParams.get('state') || undefined).data;
	const cursor = url.searchParams.get('cursor') ?? undefined;
	const found = await attempt(() => list({ state, cursor }));
	if (found.failed) error(found.status, found.refused.message);
	return { ...found.value, state: state ?? '', states: OUTBOX_STATE_WORDS };
};

export const actions: Actions = {
	try: async ({ request, locals }) => {
		const form = await request.formData();
		const done = await attempt(() => tryNow(personOf(locals.principal).id, Number(field(form, 'mail'))));
		return done.failed ? fail(done.status, done.refused) : { said: 'The mail is tried again now.' };
	}
};
