import { and, eq, inArray } from 'drizzle-orm';
import { preferences } from '../../schemas/person.ts';
import { now } from '../clock.ts';
import type { Transaction } from '../db/client.ts';
import { notification } from '../db/schema/curation.ts';
import { person } from '../db/schema/people.ts';
import { isAboutStudy, type ReviewLetter } from '../mail/review-letters.ts';
import { enqueue } from '../outbox/enqueue.ts';

/** Telling people about a version, in the transaction that gives the reason: inside the application always, by mail if they want it. */

/** Accounts that are no longer active are told nothing. */
export async function tell(
	tx: Transaction,
	personIds: readonly string[],
	letter: ReviewLetter
): Promise<void> {
	if (personIds.length === 0) return;
	const people = await tx
		.select({ id: person.id, email: person.email, preferences: person.preferences })
		.from(person)
		.where(and(inArray(person.id, [...new Set(personIds)]), eq(person.state, 'active')))
		.orderBy(person.id);
	const { kind, ...data } = letter;
	for (const one of people) {
		await tx.insert(notification).values({ personId: one.id, kind, data, createdAt: now() });
		const { mailAboutReviews, mailAboutVersions } = preferences.parse(one.preferences);
		const wanted = isAboutStudy(kind) ? mailAboutVersions : mailAboutReviews;
		if (wanted && one.email) await enqueue(tx, { letter, to: one.email });
	}
}

/** Everybody who may review, but not those who made the thing. */
export async function reviewers(tx: Transaction, but: readonly string[]): Promise<string[]> {
	const curators = await tx
		.select({ id: person.id })
		.from(person)
		.where(and(eq(person.role, 'curator'), eq(person.state, 'active')));
	return curators.map(({ id }) => id).filter((id) => !but.includes(id));
}
