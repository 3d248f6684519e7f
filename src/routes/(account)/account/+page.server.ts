import { fail, redirect } from '@sveltejs/kit';
import { preferences, profileChange, UNIT_CHOICES } from '$lib/schemas/person.ts';
import { cookieName, cookieOptions } from '$lib/server/auth/cookies.ts';
import { writeIntent } from '$lib/server/auth/link-intent.ts';
import { start } from '$lib/server/auth/openid.ts';
import { personOf, sessionOf } from '$lib/server/auth/require.ts';
import { authSettings } from '$lib/server/auth/settings.ts';
import { institutionLink, unlinkInstitution } from '$lib/server/people/account.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { leave } from '$lib/server/people/groups.ts';
import { changeProfile } from '$lib/server/people/people.ts';
import type { Actions, PageServerLoad } from './$types';

const INTENT_SECONDS = 600;
const PROBLEMS: Record<string, string> = {
	'linked-elsewhere':
		'That account of the institution is linked to another account here, so nothing was changed.',
	institution: 'The institution did not complete the sign-in, so nothing was linked.'
};

export const load: PageServerLoad = async ({ locals, url }) => {
	const person = personOf(locals.principal);
	const { openId } = authSettings();
	const problem = url.searchParams.get('problem') ?? '';
	return {
		preferences: person.preferences,
		choices: UNIT_CHOICES,
		institution: openId ? { name: openId.name, link: await institutionLink(person) } : null,
		problem: Object.hasOwn(PROBLEMS, problem) ? PROBLEMS[problem] : null
	};
};

export const actions: Actions = {
	profile: async ({ request, locals }) => {
		const form = await request.formData();
		const done = await attempt(() => {
			const wanted = {
				name: field(form, 'name'),
				preferences: preferences.parse({
					separationUnit: field(form, 'separationUnit') || undefined,
					pressureUnit: field(form, 'pressureUnit') || undefined,
					energyUnit: field(form, 'energyUnit') || undefined,
					mailAboutReviews: form.has('mailAboutReviews'),
					mailAboutVersions: form.has('mailAboutVersions')
				})
			};
			return changeProfile(personOf(locals.principal), parseForm(profileChange, wanted));
		});
		return done.failed ? fail(done.status, done.refused) : { said: 'Your profile is saved.' };
	},

	leave: async ({ request, locals }) => {
		const form = await request.formData();
		const done = await attempt(() => leave(personOf(locals.principal), field(form, 'group')));
		return done.failed ? fail(done.status, done.refused) : { said: 'You have left the group.' };
	},

	// The explicit step: only a session that asked for it may be linked when the browser comes back.
	link: async ({ request, locals, cookies }) => {
		if (!authSettings().openId) return fail(404, { message: 'No institution is set up here.', issues: [] });
		const { sessionId } = sessionOf(locals.principal);
		const step = await start({ cookie: request.headers.get('cookie') ?? '', returnTo: '/account' });
		for (const { name, value, options } of step.cookies) {
			cookies.set(name, value, { ...cookieOptions(), maxAge: options.maxAge, expires: options.expires });
		}
		cookies.set(cookieName('link-intent'), writeIntent(sessionId), {
			...cookieOptions(),
			maxAge: INTENT_SECONDS
		});
		if (step.location.startsWith('/')) redirect(303, '/account?problem=institution');
		return { continueTo: step.location };
	},

	unlink: async ({ locals }) => {
		const done = await attempt(() => unlinkInstitution(personOf(locals.principal)));
		return done.failed ? fail(done.status, done.refused) : { said: 'The institution is no longer linked.' };
	}
};
