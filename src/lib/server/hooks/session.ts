import { isStillIn } from '../auth/still-in.ts';
import { endingWithAccess } from '../auth/cut-off.ts';
import { cookieName } from '../auth/cookies.ts';
import { decide, type Verdict, type Who } from '../auth/access.ts';
import { principalOf, type Principal } from '../auth/principal.ts';
import * as installation from '../people/installation.ts';

/** Who asks, whether they may, and for how long an answer under way goes on. The hook does nothing but call these. */

const STREAM = /^(application\/x-ndjson|text\/event-stream)\b/;

export function identify(request: Request, cookie: (name: string) => string | undefined): Promise<Principal> {
	return principalOf({
		authorization: request.headers.get('authorization'),
		sessionCookie: cookie(cookieName('session'))
	});
}

export async function permit(who: Who, principal: Principal): Promise<Verdict> {
	const isVisitor = principal.kind === 'nobody';
	return decide(who, principal, isVisitor ? (await installation.read()).publicReading : false);
}

/** What a person gets is theirs: no cache between may keep it, and a stream ends with their access. */
export function personal(response: Response, principal: Principal): Response {
	if (principal.kind === 'nobody' || principal.kind === 'unknown') return response;
	const headers = new Headers(response.headers);
	headers.set('cache-control', 'private, no-store');
	const isStream = STREAM.test(headers.get('content-type') ?? '');
	const body =
		isStream && response.body ? endingWithAccess(response.body, () => isStillIn(principal)) : response.body;
	return new Response(body, { status: response.status, statusText: response.statusText, headers });
}

/** Under /api, and for whoever shows credentials that are not good. */
export function unauthenticated(): Response {
	const message = 'Sign in, or send a token that works: Authorization: Bearer hb_...';
	return Response.json(
		{ error: { code: 'sign-in', message } },
		{ status: 401, headers: { 'www-authenticate': 'Bearer', 'cache-control': 'no-store' } }
	);
}
