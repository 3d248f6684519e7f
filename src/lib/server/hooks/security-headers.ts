/** Headers that every answer carries, whoever made it. */

const ALWAYS: Record<string, string> = {
	'x-content-type-options': 'nosniff',
	'x-frame-options': 'DENY',
	// The address of a study holds the whole arrangement: other sites have no business with it.
	'referrer-policy': 'same-origin',
	'permissions-policy': 'camera=(), display-capture=(), geolocation=(), microphone=(), payment=(), usb=()',
	'cross-origin-opener-policy': 'same-origin',
	'cross-origin-resource-policy': 'same-origin'
};

/** For what is not a page: if a browser is ever led to show it, it may do nothing. */
const NOT_A_PAGE = "default-src 'none'; frame-ancestors 'none'; base-uri 'none'; form-action 'none'";

const TWO_YEARS = 2 * 365 * 24 * 3600;

/** @param secure whether the caller came over https; a plain address must not be nailed to https */
export function withSecurityHeaders(response: Response, secure: boolean): Response {
	const headers = new Headers(response.headers);
	for (const [name, value] of Object.entries(ALWAYS)) headers.set(name, value);
	if (!headers.has('content-security-policy')) headers.set('content-security-policy', NOT_A_PAGE);
	if (secure) headers.set('strict-transport-security', `max-age=${TWO_YEARS}; includeSubDomains`);
	// The headers of a redirect are immutable, so the answer is wrapped anew in every case.
	return new Response(response.body, { status: response.status, statusText: response.statusText, headers });
}
