import { and, desc, eq, gt, inArray, isNull, lt, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import { INVITATION_DAYS, type InvitationState, type NewInvitation } from '../../schemas/invitation.ts';
import { emailAddress, personName, type Role, type SignedIn } from '../../schemas/person.ts';
import { decodeCursor, page } from '../api/paginate.ts';
import { appendAudit } from '../audit/append.ts';
import { chargeWrong } from '../auth/attempts.ts';
import { hashOf, newSecret } from '../auth/secrets.ts';
import { begin, type BegunSession } from '../auth/sessions.ts';
import { authSettings } from '../auth/settings.ts';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { group } from '../db/schema/group.ts';
import { invitation } from '../db/schema/invitation.ts';
import { person } from '../db/schema/people.ts';
import { NotFound, StateError } from '../errors.ts';
import { enqueue } from '../outbox/enqueue.ts';
import { enter } from './groups.ts';
import { create } from './people.ts';
import { isLeadOf, noSuchGroup, requireMayInvite } from './rights.ts';

const DAY_MS = 24 * 3_600_000;
const PAGE = 50;

export interface InvitationSummary {
	id: string;
	email: string;
	role: Role;
	lead: boolean;
	group: string | null;
	invitedBy: string;
	state: InvitationState;
	createdAt: string;
	expiresAt: string;
}

type Row = typeof invitation.$inferSelect;

export function stateOf(row: Pick<Row, 'acceptedAt' | 'revokedAt' | 'expiresAt'>, at: Date): InvitationState {
	if (row.acceptedAt) return 'accepted';
	if (row.revokedAt) return 'revoked';
	return row.expiresAt <= at ? 'expired' : 'open';
}

/** Writes the invitation and its mail in one transaction. @returns its id */
export async function invite(actor: SignedIn, wanted: NewInvitation): Promise<string> {
	requireMayInvite(actor, wanted);
	const email = emailAddress.parse(wanted.email);
	const secret = newSecret();
	const at = now();
	return database().transaction(async (tx) => {
		let groupName: string | null = null;
		if (wanted.groupId) {
			const [found] = await tx
				.select({ name: group.name })
				.from(group)
				.where(and(eq(group.id, wanted.groupId), isNull(group.closedAt)));
			if (!found) throw noSuchGroup();
			groupName = found.name;
		}
		const [{ id }] = await tx
			.insert(invitation)
			.values({
				secretHash: hashOf(secret),
				email,
				role: wanted.role,
				groupId: wanted.groupId,
				lead: wanted.lead && wanted.groupId !== null,
				invitedBy: actor.id,
				createdAt: at,
				expiresAt: new Date(at.getTime() + INVITATION_DAYS * DAY_MS)
			})
			.returning({ id: invitation.id });
		await appendAudit(tx, {
			actor: actor.id,
			action: 'invitation.create',
			objectType: 'invitation',
			objectId: id,
			toState: 'open',
			details: { role: wanted.role, groupId: wanted.groupId, lead: wanted.lead }
		});
		await enqueue(tx, {
			letter: {
				kind: 'invitation',
				inviter: actor.name,
				role: wanted.role,
				group: groupName,
				days: INVITATION_DAYS
			},
			to: email,
			secretLink: `${authSettings().origin}/invitation?code=${secret}`,
			uselessAfter: new Date(at.getTime() + INVITATION_DAYS * DAY_MS)
		});
		return id;
	});
}

/** Administrators see all, leads those into their groups. */
function visibleTo(actor: SignedIn): SQL | undefined {
	if (actor.role === 'administrator') return undefined;
	const led = actor.groups.filter(({ lead }) => lead).map(({ id }) => id);
	return led.length > 0 ? inArray(invitation.groupId, led) : sql`false`;
}

export async function list(
	actor: SignedIn,
	{ cursor, groupId }: { cursor?: string; groupId?: string }
): Promise<{ invitations: InvitationSummary[]; next: string | null }> {
	const at = now();
	const before =
		cursor === undefined ? undefined : decodeCursor(cursor, z.tuple([z.iso.datetime(), z.uuid()]));
	const rows = await database()
		.select({ row: invitation, group: group.name, inviter: person.name })
		.from(invitation)
		.innerJoin(person, eq(person.id, invitation.invitedBy))
		.leftJoin(group, eq(group.id, invitation.groupId))
		.where(
			and(
				visibleTo(actor),
				groupId ? eq(invitation.groupId, groupId) : undefined,
				before
					? lt(
							sql`(${invitation.createdAt}, ${invitation.id})`,
							sql`(${before[0]}::timestamptz, ${before[1]}::uuid)`
						)
					: undefined
			)
		)
		.orderBy(desc(invitation.createdAt), desc(invitation.id))
		.limit(PAGE + 1);
	const shown = page(rows, PAGE, ({ row }) => [row.createdAt.toISOString(), row.id]);
	return {
		invitations: shown.rows.map(({ row, group: groupName, inviter }) => ({
			id: row.id,
			email: row.email,
			role: row.role,
			lead: row.lead,
			group: groupName,
			invitedBy: inviter,
			state: stateOf(row, at),
			createdAt: row.createdAt.toISOString(),
			expiresAt: row.expiresAt.toISOString()
		})),
		next: shown.next
	};
}

function noSuchInvitation(): NotFound {
	return new NotFound('There is no such invitation.');
}

export async function revoke(actor: SignedIn, id: string): Promise<void> {
	if (!z.uuid().safeParse(id).success) throw noSuchInvitation();
	await database().transaction(async (tx) => {
		const [row] = await tx.select().from(invitation).where(eq(invitation.id, id)).for('update');
		const managed = actor.role === 'administrator' || (row?.groupId && isLeadOf(actor, row.groupId)) || false;
		if (!row || !managed) throw noSuchInvitation();
		if (row.acceptedAt || row.revokedAt) {
			throw new StateError(`That invitation is ${stateOf(row, now())} and cannot be taken back.`);
		}
		await tx.update(invitation).set({ revokedAt: now() }).where(eq(invitation.id, id));
		await appendAudit(tx, {
			actor: actor.id,
			action: 'invitation.revoke',
			objectType: 'invitation',
			objectId: id,
			fromState: 'open',
			toState: 'revoked'
		});
	});
}

export interface OpenInvitation {
	email: string;
	role: Role;
	lead: boolean;
	group: string | null;
	invitedBy: string;
	/** An account with the address exists: it only gains the group. */
	known: boolean;
}

const openBy = (secret: string, at: Date) =>
	and(
		eq(invitation.secretHash, hashOf(secret)),
		isNull(invitation.acceptedAt),
		isNull(invitation.revokedAt),
		gt(invitation.expiresAt, at)
	);

/** What the holder of the link may see of it; null when it cannot be used. Opening it changes nothing. */
export async function look(secret: string): Promise<OpenInvitation | null> {
	const [found] = await database()
		.select({ row: invitation, group: group.name, inviter: person.name })
		.from(invitation)
		.innerJoin(person, eq(person.id, invitation.invitedBy))
		.leftJoin(group, eq(group.id, invitation.groupId))
		.where(openBy(secret, now()));
	if (!found) return null;
	const [known] = await database()
		.select({ id: person.id })
		.from(person)
		.where(eq(person.email, found.row.email));
	return {
		email: found.row.email,
		role: found.row.role,
		lead: found.row.lead,
		group: found.group,
		invitedBy: found.inviter,
		known: known !== undefined
	};
}

/**
 * Takes the invitation up: makes the account, or puts the one with that address into the group, and signs in. Its role
 * never changes an account that exists.
 *
 * @throws NotFound for an invitation that cannot be used; one answer for every reason
 */
export async function accept(request: {
	secret: string;
	name: string;
	browser: string;
	client: string;
}): Promise<BegunSession> {
	const begun = await database().transaction(async (tx) => {
		const at = now();
		const [row] = await tx.select().from(invitation).where(openBy(request.secret, at)).for('update');
		if (!row) return null;
		const [known] = await tx
			.select({ id: person.id, state: person.state })
			.from(person)
			.where(eq(person.email, row.email));
		if (known && known.state !== 'active') return null;
		const personId =
			known?.id ??
			(await create(tx, { email: row.email, name: personName.parse(request.name), role: row.role }));
		await tx
			.update(invitation)
			.set({ acceptedAt: at, acceptedBy: personId })
			.where(eq(invitation.id, row.id));
		await appendAudit(tx, {
			actor: personId,
			action: 'invitation.accept',
			objectType: 'invitation',
			objectId: row.id,
			fromState: 'open',
			toState: 'accepted'
		});
		if (row.groupId) {
			await enter(tx, { groupId: row.groupId, personId, lead: row.lead, actor: personId });
		}
		return begin(tx, { personId, begunBy: 'invitation', browser: request.browser });
	});
	if (begun) return begun;
	await chargeWrong(request.client);
	throw new NotFound(
		'This invitation cannot be used: it was taken up, taken back, or is too old. Ask for a new one.'
	);
}
