import { z } from 'zod';
import type { Role } from '../../schemas/person.ts';
import { isReviewLetter, writeReviewLetter, type ReviewLetter } from './review-letters.ts';

/** What each mail says: paragraphs, and at most one link that its reader should follow. */

export type Letter = AccountLetter | ReviewLetter;

type AccountLetter =
	| { kind: 'sign-in-link' }
	| { kind: 'invitation'; inviter: string; role: Role; group: string | null; days: number }
	| { kind: 'role-changed'; role: Role }
	| { kind: 'token-created'; name: string; expiresAt: string }
	| { kind: 'institution-linked'; institution: string }
	| { kind: 'account-removed' }
	| { kind: 'account-deleted' };

export interface Written {
	subject: string;
	paragraphs: string[];
	link?: { text: string; href: string };
	after?: string;
}

const roleWord = z.string();
const shapes = {
	'sign-in-link': z.object({}),
	invitation: z.object({
		inviter: z.string(),
		role: roleWord,
		group: z.string().nullable(),
		days: z.number()
	}),
	'role-changed': z.object({ role: roleWord }),
	'token-created': z.object({ name: z.string(), expiresAt: z.string() }),
	'institution-linked': z.object({ institution: z.string() }),
	'account-removed': z.object({}),
	'account-deleted': z.object({})
} satisfies Record<AccountLetter['kind'], z.ZodType>;

/** @throws Error for a kind that this version of the application does not know */
export function write(kind: string, data: unknown, origin: string, secretLink: string | null): Written {
	if (isReviewLetter(kind)) return writeReviewLetter(kind, data, origin);
	switch (kind) {
		case 'sign-in-link':
			return {
				subject: 'Your sign-in link for Hairsbreadth',
				paragraphs: [
					'Somebody asked to sign in to Hairsbreadth with this address. The link works once and for ten minutes.'
				],
				link: { text: 'Sign in', href: secretLink ?? origin },
				after: 'If it was not you, do nothing: without the link nobody gets in.'
			};
		case 'invitation': {
			const { inviter, role, group, days } = shapes.invitation.parse(data);
			const where = group ? `, in the group ${group}` : '';
			return {
				subject: 'You are invited to Hairsbreadth',
				paragraphs: [
					`${inviter} invites you to the Hairsbreadth installation at ${origin} as ${role}${where}.`,
					`The invitation is for this address alone and waits ${days} days.`
				],
				link: { text: 'See the invitation', href: secretLink ?? origin }
			};
		}
		case 'role-changed': {
			const { role } = shapes['role-changed'].parse(data);
			return {
				subject: `You are now ${role} in Hairsbreadth`,
				paragraphs: [
					`Your role in the Hairsbreadth installation at ${origin} is now ${role}. Your sessions have ended; sign in again to go on.`
				],
				link: { text: 'Sign in again', href: `${origin}/sign-in` }
			};
		}
		case 'token-created': {
			const { name, expiresAt } = shapes['token-created'].parse(data);
			return {
				subject: 'A new token of your Hairsbreadth account',
				paragraphs: [
					`A token named ${name} was made with your account. It works until ${expiresAt.slice(0, 10)}.`,
					'If it was not you, revoke it now and end your other sessions.'
				],
				link: { text: 'See your tokens', href: `${origin}/account/tokens` }
			};
		}
		case 'institution-linked': {
			const { institution } = shapes['institution-linked'].parse(data);
			return {
				subject: 'Your Hairsbreadth account has a new way in',
				paragraphs: [
					`You can now also sign in through ${institution}. If it was not you, tell an administrator of the installation.`
				],
				link: { text: 'See your account', href: `${origin}/account` }
			};
		}
		case 'account-removed':
			return {
				subject: 'Your access to Hairsbreadth has ended',
				paragraphs: [
					`An administrator has ended your access to the Hairsbreadth installation at ${origin}. What you published stays, under your name.`
				]
			};
		case 'account-deleted':
			return {
				subject: 'Your Hairsbreadth account is deleted',
				paragraphs: [
					'Your account and what it held about you are gone. Versions that you published keep your name, so that those who cite them can go on doing so.'
				]
			};
		default:
			throw new Error(`There is no mail of the kind ${kind}.`);
	}
}
