import type { SignedIn } from '../../schemas/person.ts';
import type { Scope } from '../../schemas/token.ts';
import { charge } from '../limits/rate.ts';
import * as tokens from '../people/tokens.ts';
import * as sessions from './sessions.ts';

/** Who a request comes from. Decided once, at the door; everything behind it asks this and nothing else. */
export type Principal =
	| { kind: 'nobody' }
	| { kind: 'session'; person: SignedIn; sessionId: string }
	| { kind: 'token'; person: SignedIn; tokenId: string; scopes: readonly Scope[] }
	/** Credentials were given and are not, or no longer, good. */
	| { kind: 'unknown' };

export const NOBODY: Principal = { kind: 'nobody' };

const BEARER = /^Bearer +([A-Za-z0-9_-]{20,120})$/i;
const PER_TOKEN = { name: 'token', amount: 600, windowSeconds: 3600, what: 'requests' };

/**
 * A token counts only in the Authorization header. Where that header is given, cookies are not looked at: a request
 * cannot borrow the rights of one and the harmlessness of the other.
 *
 * @throws TooManyRequests for a token that was used too often
 */
export async function principalOf({
	authorization,
	sessionCookie
}: {
	authorization: string | null;
	sessionCookie: string | undefined;
}): Promise<Principal> {
	if (authorization !== null) {
		const secret = BEARER.exec(authorization)?.[1];
		const found = secret ? await tokens.find(secret) : null;
		if (!found) return { kind: 'unknown' };
		await charge(PER_TOKEN, found.tokenId, 1);
		return { kind: 'token', person: found.person, tokenId: found.tokenId, scopes: found.scopes };
	}
	if (!sessionCookie) return NOBODY;
	const found = await sessions.find(sessionCookie);
	// A cookie that has run out makes a visitor, not an error: pages for everybody go on working.
	return found ? { kind: 'session', ...found } : NOBODY;
}
