import { error } from '@sveltejs/kit';
import { authSettings } from '$lib/server/auth/settings.ts';
import { demoMailbox } from '$lib/server/demo/mailbox.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ params }) => {
	if (!authSettings().demo) error(404, 'The mailbox exists in demo mode only.');
	const { mails } = await demoMailbox();
	const mail = mails().find(({ id }) => String(id) === params.id);
	if (!mail) error(404, 'There is no such mail.');
	return { mail };
};
