import { lt, sql } from 'drizzle-orm';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { rateCounter } from '../db/schema/rate.ts';
import { TooManyRequests } from '../errors.ts';

/** Limits on what one caller may use, counted in the database: they hold across processes and restarts. */

export interface Limit {
	/** What is counted; part of the key. */
	name: string;
	/** At most this much in a window. */
	amount: number;
	windowSeconds: number;
	/** Says what ran out, as "computing time". */
	what: string;
}

/** Windows that ended this long ago are of no use to anybody. */
const KEPT_SECONDS = 3600;
const SWEEP_EVERY_MS = 60_000;

let sweptAt = 0;

/**
 * Adds to what the caller has used, unless that would exceed the limit; one statement, so that two requests at the
 * same time cannot both take the last bit.
 *
 * @throws TooManyRequests saying when the next window begins
 */
export async function charge(limit: Limit, caller: string, amount: number): Promise<void> {
	const { name, windowSeconds, what } = limit;
	const seconds = now().getTime() / 1000;
	const windowStart = Math.floor(seconds / windowSeconds) * windowSeconds;
	const refused = () =>
		new TooManyRequests(
			`You have used up the ${what} of ${limit.amount} s that one caller has in ${windowSeconds} s. Try again when the next window begins.`,
			windowStart + windowSeconds - seconds
		);
	if (amount > limit.amount) throw refused();
	const taken = await database()
		.insert(rateCounter)
		.values({ key: `${name}:${caller}`, windowStart, used: amount })
		.onConflictDoUpdate({
			target: [rateCounter.key, rateCounter.windowStart],
			set: { used: sql`${rateCounter.used} + ${amount}` },
			setWhere: sql`${rateCounter.used} + ${amount} <= ${limit.amount}`
		})
		.returning({ used: rateCounter.used });
	await sweep(now().getTime());
	if (taken.length === 0) throw refused();
}

async function sweep(nowMs: number): Promise<void> {
	if (nowMs - sweptAt < SWEEP_EVERY_MS) return;
	sweptAt = nowMs;
	await database()
		.delete(rateCounter)
		.where(lt(rateCounter.windowStart, Math.floor(nowMs / 1000) - KEPT_SECONDS));
}
