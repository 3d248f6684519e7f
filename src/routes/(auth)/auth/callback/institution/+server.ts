import { browserWords } from '$lib/server/auth/browser.ts';
import { cookieName, cookieOptions } from '$lib/server/auth/cookies.ts';
import { isIntent } from '$lib/server/auth/link-intent.ts';
import { finish } from '$lib/server/auth/openid.ts';
import { returnTo } from '$lib/server/auth/return-to.ts';
import { authSettings } from '$lib/server/auth/settings.ts';
import { error, redirect } from '@sveltejs/kit';
import type { RequestHandler } from './$types';

/** Where the institution sends the browser back to; the only page of the protocol that has an address here. */
export const GET: RequestHandler = async ({ request, url, cookies, locals }) => {
	if (!authSettings().openId) error(404, 'No institution is set up here.');
	const { principal } = locals;
	const intends =
		principal.kind === 'session' && isIntent(cookies.get(cookieName('link-intent')), principal.sessionId);
	const step = await finish({
		cookie: request.headers.get('cookie') ?? '',
		query: url.search,
		browser: browserWords(request.headers.get('user-agent')),
		linkTo: intends ? principal.person : null
	});
	cookies.delete(cookieName('link-intent'), cookieOptions());
	for (const { name, value, options } of step.cookies) {
		cookies.set(name, value, { ...cookieOptions(), maxAge: options.maxAge, expires: options.expires });
	}
	const { origin } = authSettings();
	const path = step.location.startsWith(origin) ? step.location.slice(origin.length) || '/' : step.location;
	redirect(303, returnTo(path));
};
