/**
 * Whether a request that may change something was caused by another site. The framework's own check covers forms
 * only; this one looks at every method but the reading ones, whatever the content type.
 */

const READING = new Set(['GET', 'HEAD', 'OPTIONS']);
const LOOPBACK = new Set(['localhost', '127.0.0.1', '[::1]']);

export function isForeign(request: Request, ownOrigin: string): boolean {
	if (READING.has(request.method.toUpperCase())) return false;
	const origin = request.headers.get('origin');
	const site = request.headers.get('sec-fetch-site');
	// A browser that says so knows; "none" is a person who typed the address.
	if (site === 'cross-site' || site === 'same-site') return true;
	if (origin !== null) return !isOwn(origin, ownOrigin);
	if (site === 'same-origin') return false;
	// Nobody says where it comes from. Without cookies it has only the rights of anybody; with them it might be led.
	const bearer = /^bearer /i.test(request.headers.get('authorization') ?? '');
	return request.headers.has('cookie') && !bearer;
}

/** On one machine the names of the loopback address mean the same server. */
function isOwn(origin: string, ownOrigin: string): boolean {
	if (origin === ownOrigin) return true;
	if (!URL.canParse(origin)) return false;
	const [theirs, own] = [new URL(origin), new URL(ownOrigin)];
	return (
		LOOPBACK.has(theirs.hostname) &&
		LOOPBACK.has(own.hostname) &&
		theirs.protocol === own.protocol &&
		theirs.port === own.port
	);
}
