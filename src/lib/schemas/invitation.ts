import { z } from 'zod';
import { emailAddress, role } from './person.ts';

/** How long an invitation waits for its answer. */
export const INVITATION_DAYS = 14;

export const newInvitation = z.strictObject({
	email: emailAddress,
	role,
	groupId: z.uuid('choose a group of the list').nullable().default(null),
	lead: z.boolean().default(false)
});
export type NewInvitation = z.infer<typeof newInvitation>;

export type InvitationState = 'open' | 'accepted' | 'revoked' | 'expired';
