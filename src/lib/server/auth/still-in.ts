import { and, eq, gt, isNull, type SQL } from 'drizzle-orm';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { person } from '../db/schema/people.ts';
import { session } from '../db/schema/session.ts';
import { apiToken } from '../db/schema/token.ts';
import type { Principal } from './principal.ts';

/** Whether what a request was let in with would let it in now. */
export async function isStillIn(principal: Principal): Promise<boolean> {
	switch (principal.kind) {
		case 'session':
			return hasRow(
				database()
					.select({ id: person.id })
					.from(session)
					.innerJoin(person, eq(person.id, session.personId))
					.where(and(eq(session.id, principal.sessionId), gt(session.expiresAt, now()), active))
			);
		case 'token':
			return hasRow(
				database()
					.select({ id: person.id })
					.from(apiToken)
					.innerJoin(person, eq(person.id, apiToken.personId))
					.where(
						and(
							eq(apiToken.id, principal.tokenId),
							isNull(apiToken.revokedAt),
							gt(apiToken.expiresAt, now()),
							active
						)
					)
			);
		default:
			return true;
	}
}

const active: SQL = eq(person.state, 'active');

async function hasRow(rows: PromiseLike<unknown[]>): Promise<boolean> {
	return (await rows).length > 0;
}

/** For work that waits in a queue: whether the person on whose behalf it was put there still has access. */
export function isActive(personId: string): Promise<boolean> {
	return hasRow(
		database()
			.select({ id: person.id })
			.from(person)
			.where(and(eq(person.id, personId), active))
	);
}
