import type { SignedIn } from '../../schemas/person.ts';
import type { Principal } from './principal.ts';

/**
 * The person behind a request that the policy table let through. That nobody stands there means that a row of the table is
 * wrong, so it is an error of ours and not an answer.
 */
export function personOf(principal: Principal): SignedIn {
	if (principal.kind === 'session' || principal.kind === 'token') return principal.person;
	throw new Error('A route that needs a person was opened to nobody.');
}

/** As `personOf`, where the session itself is meant. */
export function sessionOf(principal: Principal): { person: SignedIn; sessionId: string } {
	if (principal.kind === 'session') return principal;
	throw new Error('A route that needs a session was opened without one.');
}
