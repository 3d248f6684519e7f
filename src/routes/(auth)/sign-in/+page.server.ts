import { fail, redirect } from '@sveltejs/kit';
import { z } from 'zod';
import { emailAddress } from '$lib/schemas/person.ts';
import { browserWords } from '$lib/server/auth/browser.ts';
import { cookieOptions } from '$lib/server/auth/cookies.ts';
import { ask } from '$lib/server/auth/email-link.ts';
import { start } from '$lib/server/auth/openid.ts';
import { returnTo } from '$lib/server/auth/return-to.ts';
import { ensureBrowserSecret, setSessionCookie } from '$lib/server/auth/set-cookie.ts';
import { authSettings } from '$lib/server/auth/settings.ts';
import { DEMO_ACCOUNTS } from '$lib/server/demo/accounts.ts';
import { signInAs } from '$lib/server/demo/sign-in.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { signInProblem } from './sign-in-problem.ts';
import type { Actions, PageServerLoad } from './$types';

const emailForm = z.object({ email: emailAddress });

export const load: PageServerLoad = ({ locals, url }) => {
	const to = returnTo(url.searchParams.get('to'));
	if (locals.principal.kind === 'session') redirect(303, to);
	const { demo, openId } = authSettings();
	return {
		to,
		problem: signInProblem(url.searchParams.get('problem')),
		institution: openId?.name ?? null,
		demoAccounts: demo
			? DEMO_ACCOUNTS.map(({ key, name, role, groups }) => ({
					key,
					name,
					role,
					groups: groups.map(({ slug, lead }) => (lead ? `leads ${slug}` : slug))
				}))
			: []
	};
};

export const actions: Actions = {
	link: async ({ request, cookies, getClientAddress, setHeaders }) => {
		const form = await request.formData();
		const email = field(form, 'email');
		const asked = await attempt(async () => {
			const { email: address } = parseForm(emailForm, { email });
			await ask({
				email: address,
				browserSecret: ensureBrowserSecret(cookies),
				client: getClientAddress()
			});
			return address;
		});
		if (asked.failed) {
			setHeaders(asked.headers);
			return fail(asked.status, { ...asked.refused, email });
		}
		return { sentTo: asked.value };
	},

	// The browser is sent on by the page, not by a redirect: the policy of the page lets a form lead to this site only.
	institution: async ({ request, cookies, url }) => {
		if (!authSettings().openId)
			return fail(404, { message: 'No institution is set up here.', issues: [], email: '' });
		const step = await start({
			cookie: request.headers.get('cookie') ?? '',
			returnTo: returnTo(url.searchParams.get('to'))
		});
		for (const { name, value, options } of step.cookies) {
			cookies.set(name, value, { ...cookieOptions(), maxAge: options.maxAge, expires: options.expires });
		}
		if (step.location.startsWith('/')) redirect(303, step.location);
		return { continueTo: step.location };
	},

	demo: async ({ request, cookies, url }) => {
		const form = await request.formData();
		const begun = await attempt(() =>
			signInAs(field(form, 'account'), browserWords(request.headers.get('user-agent')))
		);
		if (begun.failed) return fail(begun.status, { ...begun.refused, email: '' });
		setSessionCookie(cookies, begun.value);
		redirect(303, returnTo(url.searchParams.get('to')));
	}
};
