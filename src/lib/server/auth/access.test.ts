import { describe, expect, it } from 'vitest';
import { PREFERENCES_BY_DEFAULT, ROLES, type Role } from '../../schemas/person.ts';
import { SCOPES, type Scope } from '../../schemas/token.ts';
import { decide, type Who } from './access.ts';
import type { Principal } from './principal.ts';

const person = (role: Role) => ({
	id: 'a',
	name: 'Somebody',
	email: 'somebody@larkmoor.example',
	role,
	preferences: PREFERENCES_BY_DEFAULT,
	groups: []
});
const session = (role: Role): Principal => ({ kind: 'session', person: person(role), sessionId: 's' });
const token = (role: Role, ...scopes: Scope[]): Principal => ({
	kind: 'token',
	person: person(role),
	tokenId: 't',
	scopes
});

/** Written out by hand: which roles a word lets in by session, and which single scope a token needs. */
const RIGHT: Record<Who, { roles: Role[]; scope: Scope | null; visitor: boolean }> = {
	everyone: { roles: ['reader', 'researcher', 'curator', 'administrator'], scope: 'read', visitor: true },
	readers: { roles: ['reader', 'researcher', 'curator', 'administrator'], scope: 'read', visitor: true },
	computing: { roles: ['reader', 'researcher', 'curator', 'administrator'], scope: 'compute', visitor: true },
	people: { roles: ['reader', 'researcher', 'curator', 'administrator'], scope: null, visitor: false },
	'people-by-token': {
		roles: ['reader', 'researcher', 'curator', 'administrator'],
		scope: 'read',
		visitor: false
	},
	keepers: { roles: ['reader', 'researcher', 'curator', 'administrator'], scope: 'compute', visitor: false },
	uploaders: { roles: ['curator'], scope: 'upload', visitor: false },
	reviewers: { roles: ['curator'], scope: 'review', visitor: false },
	administrators: { roles: ['administrator'], scope: null, visitor: false }
};

describe('decide', () => {
	it.each(Object.keys(RIGHT) as Who[])('reads the word %s as it was meant', (who) => {
		const { roles, scope, visitor } = RIGHT[who];
		expect(decide(who, { kind: 'nobody' }, true)).toBe(visitor ? 'yes' : 'sign-in');
		for (const role of ROLES) {
			const isMeant = roles.includes(role);
			expect(decide(who, session(role), true)).toBe(isMeant ? 'yes' : 'forbidden');
			for (const single of SCOPES) {
				const fits = who === 'everyone' || (isMeant && single === scope);
				expect(decide(who, token(role, single), true)).toBe(fits ? 'yes' : 'forbidden');
			}
		}
	});

	it('keeps visitors out where the installation does not read in public, and the sign-in open', () => {
		expect(decide('readers', { kind: 'nobody' }, false)).toBe('sign-in');
		expect(decide('computing', { kind: 'nobody' }, false)).toBe('sign-in');
		expect(decide('everyone', { kind: 'nobody' }, false)).toBe('yes');
	});

	it('does not take bad credentials for none', () => {
		expect(decide('readers', { kind: 'unknown' }, true)).toBe('sign-in');
	});
});
