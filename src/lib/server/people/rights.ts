import type { Role, SignedIn } from '../../schemas/person.ts';
import { Forbidden, NotFound } from '../errors.ts';

/** Who may do what to whom. The policy table decides about addresses; these decide about objects. */

export function requireAdministrator(actor: SignedIn): void {
	if (actor.role !== 'administrator') {
		throw new Forbidden('This is for administrators of the installation. Ask one of them.');
	}
}

export function isLeadOf(actor: SignedIn, groupId: string): boolean {
	return actor.groups.some((group) => group.id === groupId && group.lead);
}

export function isMemberOf(actor: SignedIn, groupId: string): boolean {
	return actor.groups.some((group) => group.id === groupId);
}

/** What one may not see does not exist: the same answer as for a group that is not there. */
export function requireSeesGroup(actor: SignedIn, groupId: string): void {
	if (actor.role !== 'administrator' && !isMemberOf(actor, groupId)) throw noSuchGroup();
}

export function requireManagesGroup(actor: SignedIn, groupId: string): void {
	requireSeesGroup(actor, groupId);
	if (actor.role !== 'administrator' && !isLeadOf(actor, groupId)) {
		throw new Forbidden('Only a lead of the group or an administrator can do that. Ask one of them.');
	}
}

export function noSuchGroup(): NotFound {
	return new NotFound('There is no such group.');
}

/** A lead brings in those who work and those who read; whoever reviews or administers is let in by an administrator. */
const ROLES_OF_A_LEAD: readonly Role[] = ['reader', 'researcher'];

/** @throws Forbidden when the invitation would give more than the inviter may give */
export function requireMayInvite(
	actor: SignedIn,
	{ role, groupId, lead }: { role: Role; groupId: string | null; lead: boolean }
): void {
	if (actor.role === 'administrator') return;
	if (groupId === null) throw new Forbidden('Choose one of the groups that you lead.');
	requireManagesGroup(actor, groupId);
	if (!ROLES_OF_A_LEAD.includes(role) || lead) {
		throw new Forbidden(
			'A lead invites readers and researchers. Ask an administrator to invite others or leads.'
		);
	}
}
