import { authSettings } from './settings.ts';

/** Names of the cookies. Over https they carry the prefix that keeps other hosts and paths from planting them. */

export type CookieUse = 'session' | 'browser' | 'link-intent' | 'state' | 'pkce' | 'nonce' | 'return';

export function cookieName(use: CookieUse): string {
	return `${authSettings().secure ? '__Host-' : ''}hairsbreadth-${use}`;
}

export function cookieOptions(): { path: '/'; httpOnly: true; sameSite: 'lax'; secure: boolean } {
	return { path: '/', httpOnly: true, sameSite: 'lax', secure: authSettings().secure };
}
