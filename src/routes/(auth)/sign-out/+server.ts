import { redirect } from '@sveltejs/kit';
import { clearSessionCookie } from '$lib/server/auth/set-cookie.ts';
import { end } from '$lib/server/auth/sessions.ts';
import type { RequestHandler } from './$types';

/** Ends the session on the server too: a copy of the cookie is worth nothing afterwards. */
export const POST: RequestHandler = async ({ locals, cookies }) => {
	const { principal } = locals;
	if (principal.kind === 'session') await end(principal.person.id, principal.sessionId);
	clearSessionCookie(cookies);
	redirect(303, '/');
};
