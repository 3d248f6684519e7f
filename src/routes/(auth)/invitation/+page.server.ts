import { fail, redirect } from '@sveltejs/kit';
import { personName } from '$lib/schemas/person.ts';
import { browserWords } from '$lib/server/auth/browser.ts';
import { setSessionCookie } from '$lib/server/auth/set-cookie.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { accept, look } from '$lib/server/people/invitations.ts';
import { z } from 'zod';
import type { Actions, PageServerLoad } from './$types';

const nameForm = z.object({ name: personName });

export const load: PageServerLoad = async ({ url, setHeaders }) => {
	setHeaders({ 'cache-control': 'no-store' });
	const code = url.searchParams.get('code') ?? '';
	return { code, invitation: await look(code) };
};

export const actions: Actions = {
	default: async ({ request, cookies, getClientAddress, setHeaders }) => {
		const form = await request.formData();
		const code = field(form, 'code');
		const name = field(form, 'name');
		const begun = await attempt(async () => {
			const invitation = await look(code);
			if (invitation && !invitation.known) parseForm(nameForm, { name });
			return accept({
				secret: code,
				name,
				browser: browserWords(request.headers.get('user-agent')),
				client: getClientAddress()
			});
		});
		if (begun.failed) {
			setHeaders(begun.headers);
			return fail(begun.status, { ...begun.refused, name });
		}
		setSessionCookie(cookies, begun.value);
		redirect(303, '/account');
	}
};
