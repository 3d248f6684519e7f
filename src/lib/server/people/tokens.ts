import { and, desc, eq, gt, isNull, lt, sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { SignedIn } from '../../schemas/person.ts';
import type { NewToken, Scope, TokenSummary } from '../../schemas/token.ts';
import { decodeCursor, page } from '../api/paginate.ts';
import { appendAudit } from '../audit/append.ts';
import { hashOf, newSecret } from '../auth/secrets.ts';
import { now } from '../clock.ts';
import { database, type Transaction } from '../db/client.ts';
import { person } from '../db/schema/people.ts';
import { apiToken } from '../db/schema/token.ts';
import { NotFound, StateError } from '../errors.ts';
import { enqueue } from '../outbox/enqueue.ts';
import { requireAdministrator } from './rights.ts';
import { signedIn } from './signed-in.ts';

/** Personal tokens of the API: shown once, kept as a hash, able to do only what their scopes and their owner's role allow. */

const PREFIX = 'hb_';
const BEGINNING = 10;
const DAY_MS = 24 * 3_600_000;
const SEEN_EVERY_MS = 60_000;
const LIVE_MAX = 50;
const PAGE = 50;

export interface MadeToken {
	/** Shown to its owner now and never again. */
	secret: string;
	token: TokenSummary;
}

const summary = (row: typeof apiToken.$inferSelect): TokenSummary => ({
	id: row.id,
	name: row.name,
	beginning: row.beginning,
	scopes: row.scopes,
	createdAt: row.createdAt.toISOString(),
	expiresAt: row.expiresAt.toISOString(),
	lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
	revokedAt: row.revokedAt?.toISOString() ?? null
});

const live = (at: Date) => and(isNull(apiToken.revokedAt), gt(apiToken.expiresAt, at));

/** @throws StateError when the owner has too many already */
export async function create(owner: SignedIn, wanted: NewToken): Promise<MadeToken> {
	const at = now();
	const secret = `${PREFIX}${newSecret()}`;
	return database().transaction(async (tx) => {
		// The owner's row orders two requests, so that both cannot take the last place.
		await tx.select({ id: person.id }).from(person).where(eq(person.id, owner.id)).for('update');
		const held = await tx
			.select({ id: apiToken.id })
			.from(apiToken)
			.where(and(eq(apiToken.personId, owner.id), live(at)))
			.limit(LIVE_MAX);
		if (held.length === LIVE_MAX) {
			throw new StateError(
				`You have ${LIVE_MAX} tokens that work. Revoke one that you no longer need, then repeat.`
			);
		}
		const [row] = await tx
			.insert(apiToken)
			.values({
				secretHash: hashOf(secret),
				personId: owner.id,
				name: wanted.name,
				beginning: secret.slice(0, BEGINNING),
				scopes: [...new Set(wanted.scopes)],
				createdAt: at,
				expiresAt: new Date(at.getTime() + wanted.days * DAY_MS)
			})
			.returning();
		await appendAudit(tx, {
			actor: owner.id,
			action: 'token.create',
			objectType: 'token',
			objectId: row.id,
			details: { scopes: row.scopes, days: wanted.days }
		});
		await enqueue(tx, {
			letter: { kind: 'token-created', name: row.name, expiresAt: row.expiresAt.toISOString() },
			to: owner.email
		});
		return { secret, token: summary(row) };
	});
}

export interface FoundToken {
	tokenId: string;
	scopes: Scope[];
	person: SignedIn;
}

/** The owner behind a bearer token; null for an unknown, revoked or expired one and for a removed owner. */
export async function find(secret: string): Promise<FoundToken | null> {
	const at = now();
	const [found] = await database()
		.select({
			id: apiToken.id,
			personId: apiToken.personId,
			scopes: apiToken.scopes,
			lastUsedAt: apiToken.lastUsedAt
		})
		.from(apiToken)
		.where(and(eq(apiToken.secretHash, hashOf(secret)), live(at)));
	if (!found) return null;
	const owner = await signedIn(database(), found.personId);
	if (!owner) return null;
	if (!found.lastUsedAt || at.getTime() - found.lastUsedAt.getTime() > SEEN_EVERY_MS) {
		await database().update(apiToken).set({ lastUsedAt: at }).where(eq(apiToken.id, found.id));
	}
	return { tokenId: found.id, scopes: found.scopes, person: owner };
}

export async function list(owner: SignedIn): Promise<TokenSummary[]> {
	const rows = await database()
		.select()
		.from(apiToken)
		.where(eq(apiToken.personId, owner.id))
		.orderBy(desc(apiToken.createdAt))
		.limit(200);
	return rows.map(summary);
}

/** One's own. @throws NotFound for everything else, whoever asks */
export function revokeOwn(actor: SignedIn, id: string): Promise<void> {
	return revokeWhere(actor, id, eq(apiToken.personId, actor.id));
}

export async function revokeAnybodys(actor: SignedIn, id: string): Promise<void> {
	requireAdministrator(actor);
	await revokeWhere(actor, id, undefined);
}

async function revokeWhere(actor: SignedIn, id: string, which: SQL | undefined): Promise<void> {
	if (!z.uuid().safeParse(id).success) throw noSuchToken();
	await database().transaction(async (tx) => {
		const [row] = await tx
			.select({ revokedAt: apiToken.revokedAt })
			.from(apiToken)
			.where(and(eq(apiToken.id, id), which))
			.for('update');
		if (!row) throw noSuchToken();
		if (row.revokedAt) return;
		await markRevoked(tx, actor.id, id);
	});
}

function noSuchToken(): NotFound {
	return new NotFound('There is no such token.');
}

async function markRevoked(tx: Transaction, actor: string, id: string): Promise<void> {
	await tx.update(apiToken).set({ revokedAt: now() }).where(eq(apiToken.id, id));
	await appendAudit(tx, { actor, action: 'token.revoke', objectType: 'token', objectId: id });
}

export async function revokeAll(
	tx: Transaction,
	{ personId, actor }: { personId: string; actor: string }
): Promise<void> {
	const held = await tx
		.select({ id: apiToken.id })
		.from(apiToken)
		.where(and(eq(apiToken.personId, personId), isNull(apiToken.revokedAt)))
		.for('update');
	for (const { id } of held) await markRevoked(tx, actor, id);
}

export interface TokenInUse extends TokenSummary {
	owner: { id: string; name: string };
}

/** Tokens of everybody, newest first, for the administrator. */
export async function listAll(
	actor: SignedIn,
	{ cursor }: { cursor?: string }
): Promise<{ tokens: TokenInUse[]; next: string | null }> {
	requireAdministrator(actor);
	const before =
		cursor === undefined ? undefined : decodeCursor(cursor, z.tuple([z.iso.datetime(), z.uuid()]));
	const rows = await database()
		.select({ token: apiToken, name: person.name })
		.from(apiToken)
		.innerJoin(person, eq(person.id, apiToken.personId))
		.where(
			before
				? lt(
						sql`(${apiToken.createdAt}, ${apiToken.id})`,
						sql`(${before[0]}::timestamptz, ${before[1]}::uuid)`
					)
				: undefined
		)
		.orderBy(desc(apiToken.createdAt), desc(apiToken.id))
		.limit(PAGE + 1);
	const shown = page(rows, PAGE, ({ token }) => [token.createdAt.toISOString(), token.id]);
	return {
		tokens: shown.rows.map(({ token, name }) => ({
			...summary(token),
			owner: { id: token.personId, name }
		})),
		next: shown.next
	};
}
