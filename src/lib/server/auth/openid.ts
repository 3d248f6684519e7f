import { Auth, raw, skipCSRFCheck, type AuthConfig } from '@auth/core';
import { AuthError } from '@auth/core/errors';
import { eq } from 'drizzle-orm';
import { ROLES, type Role, type SignedIn } from '../../schemas/person.ts';
import { database } from '../db/client.ts';
import { person } from '../db/schema/people.ts';
import { log } from '../log.ts';
import { cookieName, cookieOptions } from './cookies.ts';
import { openIdAdapter, type Arrival } from './openid-adapter.ts';
import { keyFor } from './secrets.ts';
import { authSettings, type OpenIdSettings } from './settings.ts';

/**
 * Sign-in through the institution's OpenID Connect provider. Auth.js speaks the protocol (discovery, PKCE, state, nonce,
 * exchange); which addresses exist is decided here: only the start and the return, never its session endpoint, its pages
 * or its idea of the host, because every request it sees is made from the installation's own address.
 */

export const PROVIDER = 'institution';
const BASE = '/auth';
/** Auth.js encrypts its short-lived cookies with it. */
const FLOW_MINUTES = 10;

export interface FlowCookie {
	name: string;
	value: string;
	options: { maxAge?: number; expires?: Date };
}

export interface FlowStep {
	cookies: FlowCookie[];
	/** Where the browser goes next: the provider's address, or a path of ours. */
	location: string;
}

/** The highest of the roles that the person's groups are mapped to; null when none of them is on the list. */
export function mappedRole(
	profile: Record<string, unknown>,
	{ groupsClaim, roles }: OpenIdSettings
): Role | null {
	const claim = profile[groupsClaim];
	const groups = Array.isArray(claim) ? claim.filter((name) => typeof name === 'string') : [];
	const given = groups.filter((name) => Object.hasOwn(roles, name)).map((name) => ROLES.indexOf(roles[name]));
	return given.length > 0 ? ROLES[Math.max(...given)] : null;
}

function requireSettings(): OpenIdSettings {
	const { openId } = authSettings();
	if (!openId) throw new Error('No OpenID Connect provider is set up.');
	return openId;
}

const shortLived = (use: 'state' | 'pkce' | 'nonce') => ({
	name: cookieName(use),
	options: { ...cookieOptions(), maxAge: FLOW_MINUTES * 60 }
});

function configFor(arrival: Arrival): AuthConfig & { raw: typeof raw } {
	const openId = requireSettings();
	return {
		raw,
		basePath: BASE,
		// Safe because the request below is made from the configured origin, whatever headers came in.
		trustHost: true,
		// The hook has compared the origin of the request already.
		skipCSRFCheck,
		secret: keyFor('auth').toString('base64url'),
		useSecureCookies: authSettings().secure,
		adapter: openIdAdapter(arrival),
		session: { strategy: 'database' },
		pages: { signIn: '/sign-in', signOut: '/sign-in', error: '/sign-in', verifyRequest: '/sign-in' },
		cookies: {
			sessionToken: { name: cookieName('session'), options: cookieOptions() },
			callbackUrl: { name: cookieName('return'), options: cookieOptions() },
			state: shortLived('state'),
			pkceCodeVerifier: shortLived('pkce'),
			nonce: shortLived('nonce')
		},
		providers: [
			{
				id: PROVIDER,
				name: openId.name,
				type: 'oidc',
				issuer: openId.issuer,
				clientId: openId.clientId,
				clientSecret: openId.clientSecret,
				checks: ['pkce', 'state', 'nonce'],
				authorization: { params: { scope: openId.scopes } },
				profile: (profile) => ({
					id: profile.sub,
					name: typeof profile.name === 'string' ? profile.name : null,
					email: typeof profile.email === 'string' ? profile.email.toLowerCase() : null
				}),
				account: () => ({})
			}
		],
		callbacks: {
			signIn: ({ profile }) => admit(arrival, (profile ?? {}) as Record<string, unknown>, openId),
			// Nothing asks for it: the endpoint that would answer with it has no address.
			session: ({ session }) => ({ expires: session.expires })
		},
		logger: {
			error: (error) => log().warn({ error: error.name }, 'sign-in through the institution failed'),
			warn: () => undefined,
			debug: () => undefined
		}
	};
}

/** @returns true, or the page that says why not */
async function admit(
	arrival: Arrival,
	profile: Record<string, unknown>,
	openId: OpenIdSettings
): Promise<true | string> {
	arrival.role = mappedRole(profile, openId);
	if (arrival.linkTo) return true;
	const known = await accountOf(typeof profile.sub === 'string' ? profile.sub : '');
	if (known?.roleFrom === 'installation') return true;
	if (!arrival.role) return '/sign-in?problem=no-group';
	if (!known && (typeof profile.email !== 'string' || profile.email_verified !== true)) {
		return '/sign-in?problem=unverified';
	}
	return true;
}

async function accountOf(subject: string): Promise<{ roleFrom: string } | undefined> {
	const linked = await openIdAdapter({ linkTo: null, browser: '', role: null }).getUserByAccount?.({
		provider: PROVIDER,
		providerAccountId: subject
	});
	if (!linked) return undefined;
	const [found] = await database()
		.select({ roleFrom: person.roleFrom })
		.from(person)
		.where(eq(person.id, linked.id));
	return found;
}

async function step(
	path: string,
	init: RequestInit & { cookie: string },
	arrival: Arrival
): Promise<FlowStep> {
	const { cookie, ...rest } = init;
	const headers = new Headers(rest.headers);
	headers.set('cookie', cookie);
	const request = new Request(`${authSettings().origin}${BASE}${path}`, { ...rest, headers });
	try {
		const answer = await Auth(request, configFor(arrival));
		return {
			cookies: (answer.cookies ?? []).map(({ name, value, options }) => ({ name, value, options })),
			location: answer.redirect ?? '/sign-in?problem=institution'
		};
	} catch (error) {
		if (!(error instanceof AuthError)) throw error;
		const linked = error.type === 'OAuthAccountNotLinked';
		const problem = linked ? (arrival.linkTo ? 'linked-elsewhere' : 'not-linked') : 'institution';
		return { cookies: [], location: `${arrival.linkTo ? '/account' : '/sign-in'}?problem=${problem}` };
	}
}

/** Sends the browser off. @returns cookies to set and the provider's address */
export function start({ cookie, returnTo }: { cookie: string; returnTo: string }): Promise<FlowStep> {
	const body = new URLSearchParams({ callbackUrl: `${authSettings().origin}${returnTo}` });
	return step(
		`/signin/${PROVIDER}`,
		{ method: 'POST', body, cookie },
		{ linkTo: null, browser: '', role: null }
	);
}

/** Takes the browser back, with what the provider put into the address. */
export function finish({
	cookie,
	query,
	browser,
	linkTo
}: {
	cookie: string;
	query: string;
	browser: string;
	linkTo: SignedIn | null;
}): Promise<FlowStep> {
	return step(`/callback/${PROVIDER}${query}`, { method: 'GET', cookie }, { linkTo, browser, role: null });
}
