import { error } from '@sveltejs/kit';
import { authSettings } from '$lib/server/auth/settings.ts';
import { demoMailbox } from '$lib/server/demo/mailbox.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async () => {
	if (!authSettings().demo) error(404, 'The mailbox exists in demo mode only.');
	const { mails } = await demoMailbox();
	return { mails: mails().map(({ id, at, to, subject }) => ({ id, at, to, subject })) };
};
