import { ROLES, type Role } from '../../schemas/person.ts';
import type { Scope } from '../../schemas/token.ts';
import type { Principal } from './principal.ts';

/** What the words of the policy table mean, and the one decision that is made with them. */

interface Meaning {
	/** Whether it is answered without a sign-in: always, while the installation reads in public, or never. */
	signedOut: 'always' | 'public' | 'never';
	roles: readonly Role[];
	/** What a token needs; null: not by token at all. */
	scope: Scope | null;
}

export const MEANINGS = {
	/** Signing in itself, and what says that the installation is there. */
	everyone: { signedOut: 'always', roles: ROLES, scope: 'read' },
	readers: { signedOut: 'public', roles: ROLES, scope: 'read' },
	computing: { signedOut: 'public', roles: ROLES, scope: 'compute' },
	/** One's own account: by a browser only, so that a token cannot make more of itself. */
	people: { signedOut: 'never', roles: ROLES, scope: null },
	/** What a person may also look at through a program. */
	'people-by-token': { signedOut: 'never', roles: ROLES, scope: 'read' },
	/** Keeping studies: by a browser, or by a token that may compute. */
	keepers: { signedOut: 'never', roles: ROLES, scope: 'compute' },
	uploaders: { signedOut: 'never', roles: ['curator'], scope: 'upload' },
	reviewers: { signedOut: 'never', roles: ['curator'], scope: 'review' },
	administrators: { signedOut: 'never', roles: ['administrator'], scope: null }
} as const satisfies Record<string, Meaning>;

export type Who = keyof typeof MEANINGS;

export type Verdict = 'yes' | 'sign-in' | 'forbidden';

export function decide(who: Who, principal: Principal, publicReading: boolean): Verdict {
	const { signedOut, roles, scope }: Meaning = MEANINGS[who];
	if (signedOut === 'always') return 'yes';
	switch (principal.kind) {
		case 'unknown':
			return 'sign-in';
		case 'nobody':
			return signedOut === 'public' && publicReading ? 'yes' : 'sign-in';
		case 'session':
			return roles.includes(principal.person.role) ? 'yes' : 'forbidden';
		case 'token':
			return scope !== null && principal.scopes.includes(scope) && roles.includes(principal.person.role)
				? 'yes'
				: 'forbidden';
	}
}
