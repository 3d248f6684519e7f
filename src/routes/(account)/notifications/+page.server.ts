import { personOf } from '$lib/server/auth/require.ts';
import { list, markRead } from '$lib/server/notifications/list.ts';
import { field } from '$lib/server/people/attempt.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) =>
	list(personOf(locals.principal), url.searchParams.get('cursor') ?? undefined);

export const actions: Actions = {
	read: async ({ request, locals }) => {
		const id = Number(field(await request.formData(), 'notification'));
		if (Number.isSafeInteger(id)) await markRead(personOf(locals.principal), id);
	},
	all: async ({ locals }) => {
		await markRead(personOf(locals.principal));
		return { said: 'All are marked as read.' };
	}
};
