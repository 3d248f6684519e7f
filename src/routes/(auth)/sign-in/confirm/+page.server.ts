import { fail, redirect } from '@sveltejs/kit';
import { browserWords } from '$lib/server/auth/browser.ts';
import { look, use } from '$lib/server/auth/email-link.ts';
import { browserSecret, setSessionCookie } from '$lib/server/auth/set-cookie.ts';
import { attempt, field } from '$lib/server/people/attempt.ts';
import type { Actions, PageServerLoad } from './$types';

const UNUSABLE =
	'This link cannot be used: it was used already, is older than ten minutes, or never existed.';

/** Looks and changes nothing: scanners of mail open links too. */
export const load: PageServerLoad = async ({ url, cookies, setHeaders }) => {
	setHeaders({ 'cache-control': 'no-store' });
	const secret = url.searchParams.get('link') ?? '';
	const view = await look(secret, browserSecret(cookies));
	return { secret, view };
};

export const actions: Actions = {
	default: async ({ request, cookies, getClientAddress, setHeaders }) => {
		const form = await request.formData();
		const used = await attempt(() =>
			use({
				secret: field(form, 'link'),
				browserSecret: browserSecret(cookies),
				confirmed: field(form, 'confirmed') === 'yes',
				browser: browserWords(request.headers.get('user-agent')),
				client: getClientAddress()
			})
		);
		if (used.failed) {
			setHeaders(used.headers);
			return fail(used.status, { message: used.refused.message });
		}
		if (used.value.kind === 'unusable') return fail(400, { message: UNUSABLE });
		if (used.value.kind === 'confirm') {
			return fail(400, { message: 'Say first that you asked for this link yourself, in another browser.' });
		}
		setSessionCookie(cookies, used.value.session);
		redirect(303, '/');
	}
};
