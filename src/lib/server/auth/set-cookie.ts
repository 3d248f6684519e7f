import { cookieName, cookieOptions } from './cookies.ts';
import { newSecret } from './secrets.ts';
import type { BegunSession } from './sessions.ts';

/** The part of the framework's cookie jar that is used here. */
export interface CookieJar {
	get: (name: string) => string | undefined;
	set: (
		name: string,
		value: string,
		options: {
			path: string;
			httpOnly?: boolean;
			sameSite?: 'lax';
			secure?: boolean;
			expires?: Date;
			maxAge?: number;
		}
	) => void;
	delete: (
		name: string,
		options: { path: string; httpOnly?: boolean; sameSite?: 'lax'; secure?: boolean }
	) => void;
}

const YEAR_SECONDS = 365 * 24 * 3600;

export function setSessionCookie(cookies: CookieJar, begun: BegunSession): void {
	cookies.set(cookieName('session'), begun.secret, { ...cookieOptions(), expires: begun.expiresAt });
}

export function clearSessionCookie(cookies: CookieJar): void {
	cookies.delete(cookieName('session'), cookieOptions());
}

/** Names the browser, so that a sign-in link can be held to the one that asked for it. */
export function browserSecret(cookies: CookieJar): string | null {
	return cookies.get(cookieName('browser')) ?? null;
}

export function ensureBrowserSecret(cookies: CookieJar): string {
	const secret = browserSecret(cookies) ?? newSecret();
	cookies.set(cookieName('browser'), secret, { ...cookieOptions(), maxAge: YEAR_SECONDS });
	return secret;
}
