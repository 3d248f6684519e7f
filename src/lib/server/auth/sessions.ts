import { and, desc, eq, gt, lt, ne, or, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { SignedIn } from '../../schemas/person.ts';
import { appendAudit, INSTALLATION } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database, type Transaction } from '../db/client.ts';
import { session, type SessionBeginning } from '../db/schema/session.ts';
import { NotFound } from '../errors.ts';
import { signedIn } from '../people/signed-in.ts';
import { hashOf, newSecret } from './secrets.ts';

/** Sessions live in the database, so that ending one counts at the next request. */

export const IDLE_HOURS = 24;
export const ABSOLUTE_DAYS = 30;

const HOUR_MS = 3_600_000;
/** How exactly the time last seen is kept: not every request writes. */
const SEEN_EVERY_MS = 60_000;

export interface BegunSession {
	id: string;
	/** Goes into the cookie and nowhere else. */
	secret: string;
	expiresAt: Date;
}

export interface FoundSession {
	sessionId: string;
	person: SignedIn;
}

export interface SessionSummary {
	id: string;
	browser: string;
	begunBy: SessionBeginning;
	createdAt: string;
	lastSeenAt: string;
	expiresAt: string;
	current: boolean;
}

/** Always a new secret: what a browser carried before signing in is worth nothing afterwards. */
export async function begin(
	tx: Transaction,
	{ personId, begunBy, browser }: { personId: string; begunBy: SessionBeginning; browser: string }
): Promise<BegunSession> {
	const at = now();
	const secret = newSecret();
	const expiresAt = new Date(at.getTime() + ABSOLUTE_DAYS * 24 * HOUR_MS);
	const [{ id }] = await tx
		.insert(session)
		.values({
			secretHash: hashOf(secret),
			personId,
			begunBy,
			browser: browser.slice(0, 120),
			createdAt: at,
			lastSeenAt: at,
			expiresAt
		})
		.returning({ id: session.id });
	await appendAudit(tx, {
		actor: personId,
		action: 'session.begin',
		objectType: 'session',
		objectId: id,
		details: { by: begunBy }
	});
	return { id, secret, expiresAt };
}

/** The person behind a cookie; null for an unknown, idle, over-aged or ended session and for a removed person. */
export async function find(secret: string): Promise<FoundSession | null> {
	const at = now();
	const [found] = await database()
		.select({ id: session.id, personId: session.personId, lastSeenAt: session.lastSeenAt })
		.from(session)
		.where(and(eq(session.secretHash, hashOf(secret)), isLive(at)));
	if (!found) return null;
	const person = await signedIn(database(), found.personId);
	if (!person) return null;
	if (at.getTime() - found.lastSeenAt.getTime() > SEEN_EVERY_MS) {
		await database().update(session).set({ lastSeenAt: at }).where(eq(session.id, found.id));
	}
	return { sessionId: found.id, person };
}

function isLive(at: Date): SQL | undefined {
	return and(
		gt(session.expiresAt, at),
		gt(session.lastSeenAt, new Date(at.getTime() - IDLE_HOURS * HOUR_MS))
	);
}

export async function list(personId: string, currentId: string | null): Promise<SessionSummary[]> {
	const rows = await database()
		.select()
		.from(session)
		.where(and(eq(session.personId, personId), isLive(now())))
		.orderBy(desc(session.lastSeenAt))
		.limit(200);
	return rows.map((row) => ({
		id: row.id,
		browser: row.browser,
		begunBy: row.begunBy,
		createdAt: row.createdAt.toISOString(),
		lastSeenAt: row.lastSeenAt.toISOString(),
		expiresAt: row.expiresAt.toISOString(),
		current: row.id === currentId
	}));
}

/** @throws NotFound for a session that is over or somebody else's */
export async function end(personId: string, sessionId: string): Promise<void> {
	if (!z.uuid().safeParse(sessionId).success) throw new NotFound('That session has ended already.');
	await database().transaction(async (tx) => {
		const ended = await remove(
			tx,
			personId,
			and(eq(session.personId, personId), eq(session.id, sessionId)),
			'session.end'
		);
		if (ended === 0) throw new NotFound('That session has ended already.');
	});
}

/** Ends every session of a person, or every other one. @returns how many */
export async function endAll(
	tx: Transaction,
	{ personId, actor, except }: { personId: string; actor: string; except?: string }
): Promise<number> {
	const others = except ? ne(session.id, except) : undefined;
	return remove(tx, actor, and(eq(session.personId, personId), others), 'session.end');
}

/** Every session of one's own but the one that asks. @returns how many */
export function endOthers(personId: string, sessionId: string): Promise<number> {
	return database().transaction((tx) => endAll(tx, { personId, actor: personId, except: sessionId }));
}

/** Clears away what nobody can use any more. */
export async function sweep(): Promise<number> {
	const at = now();
	return database().transaction((tx) =>
		remove(
			tx,
			INSTALLATION,
			or(lt(session.expiresAt, at), lt(session.lastSeenAt, new Date(at.getTime() - IDLE_HOURS * HOUR_MS))),
			'session.expire'
		)
	);
}

async function remove(
	tx: Transaction,
	actor: string,
	which: SQL | undefined,
	action: string
): Promise<number> {
	const ended = await tx
		.delete(session)
		.where(which ?? sql`false`)
		.returning({ id: session.id });
	for (const { id } of ended) await appendAudit(tx, { actor, action, objectType: 'session', objectId: id });
	return ended.length;
}
