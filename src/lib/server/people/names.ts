import { inArray } from 'drizzle-orm';
import { z } from 'zod';
import { database } from '../db/client.ts';
import { person } from '../db/schema/people.ts';

/** Names of those of the actors that are accounts; deleted ones keep theirs. */
export async function namesOf(actors: readonly string[]): Promise<Map<string, string>> {
	const ids = [...new Set(actors)].filter((actor) => z.uuid().safeParse(actor).success);
	if (ids.length === 0) return new Map();
	const rows = await database()
		.select({ id: person.id, name: person.name })
		.from(person)
		.where(inArray(person.id, ids));
	return new Map(rows.map(({ id, name }) => [id, name]));
}
