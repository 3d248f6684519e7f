import { createHmac, timingSafeEqual } from 'node:crypto';
import { now } from '../clock.ts';
import { keyFor } from './secrets.ts';

/**
 * Says that the person of a session pressed the button that links the institution's account. Without it a sign-in that
 * comes back from the institution never changes an account, whoever's browser it comes back to.
 */

const VALID_MS = 10 * 60_000;

function signature(sessionId: string, until: number): Buffer {
	return createHmac('sha256', keyFor('link-intent')).update(`${sessionId} ${until}`).digest();
}

export function writeIntent(sessionId: string): string {
	const until = now().getTime() + VALID_MS;
	return `${until}.${signature(sessionId, until).toString('base64url')}`;
}

export function isIntent(text: string | undefined, sessionId: string): boolean {
	const [until, signed] = (text ?? '').split('.');
	if (!/^\d{1,16}$/.test(until) || !signed || Number(until) < now().getTime()) return false;
	const given = Buffer.from(signed, 'base64url');
	const right = signature(sessionId, Number(until));
	return given.byteLength === right.byteLength && timingSafeEqual(given, right);
}
