import { and, eq, lt } from 'drizzle-orm';
import { answering } from '../api/problem.ts';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { answeredRequest } from '../db/schema/curation.ts';
import { Conflict, InvalidInput } from '../errors.ts';
import { canonicalJson, sha256 } from './canonical.ts';

/** The header Idempotency-Key: a POST that is sent twice is done once, and both get the same answer. */

const KEPT_MS = 24 * 3_600_000;
/** A process that died over a request does not hold its key for longer. */
const UNDER_WAY_MS = 120_000;
const KEY = /^[\x21-\x7e]{1,200}$/;

interface Asked {
	personId: string;
	method: string;
	path: string;
	/** Null where the caller sent none. */
	key: string | null;
	/** What the request says, as far as it matters to its answer. */
	content: unknown;
}

/**
 * Answers as `work` does, or as it did the first time. Answers of 5xx are not kept: those may be tried again.
 *
 * @throws InvalidInput for a key that was used for another request; Conflict while the first one is still running
 */
export async function answerOnce(asked: Asked, work: () => Promise<Response>): Promise<Response> {
	const { key, personId } = asked;
	if (key === null) return work();
	if (!KEY.test(key)) {
		throw new InvalidInput('The Idempotency-Key cannot be used.', [
			{ path: 'idempotency-key', message: '1 to 200 visible ASCII characters' }
		]);
	}
	const request = sha256(canonicalJson([asked.method, asked.path, asked.content]));
	const earlier = await reserve(personId, key, request);
	if (earlier) return earlier;

	const mine = and(eq(answeredRequest.personId, personId), eq(answeredRequest.key, key));
	const response = await answering(work);
	if (response.status >= 500) {
		await database().delete(answeredRequest).where(mine);
		return response;
	}
	const body = await response.clone().text();
	await database().update(answeredRequest).set({ status: response.status, body }).where(mine);
	return response;
}

/** The earlier answer, or null where this request is the first one and now holds the key. */
async function reserve(personId: string, key: string, request: string): Promise<Response | null> {
	const at = now();
	await database()
		.delete(answeredRequest)
		.where(lt(answeredRequest.at, new Date(at.getTime() - KEPT_MS)));
	const taken = await database()
		.insert(answeredRequest)
		.values({ personId, key, request, at })
		.onConflictDoNothing()
		.returning({ key: answeredRequest.key });
	if (taken.length > 0) return null;

	const [known] = await database()
		.select()
		.from(answeredRequest)
		.where(and(eq(answeredRequest.personId, personId), eq(answeredRequest.key, key)));
	if (!known) throw new Conflict('A request with this Idempotency-Key has just failed. Send it again.');
	if (known.request !== request) {
		throw new InvalidInput('The Idempotency-Key was used for another request.', [
			{ path: 'idempotency-key', message: 'take a new key for every request that differs' }
		]);
	}
	if (known.status !== null)
		return new Response(known.body, {
			status: known.status,
			headers: {
				'content-type': 'application/json',
				'cache-control': 'no-store',
				'idempotency-replayed': 'true'
			}
		});
	if (at.getTime() - known.at.getTime() < UNDER_WAY_MS)
		throw new Conflict('A request with this Idempotency-Key is being answered. Wait for it.');
	const overtaken = await database()
		.update(answeredRequest)
		.set({ at })
		.where(
			and(
				eq(answeredRequest.personId, personId),
				eq(answeredRequest.key, key),
				eq(answeredRequest.at, known.at)
			)
		)
		.returning({ key: answeredRequest.key });
	if (overtaken.length > 0) return null;
	throw new Conflict('A request with this Idempotency-Key is being answered. Wait for it.');
}
