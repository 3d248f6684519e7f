import { and, eq } from 'drizzle-orm';
import { begin, type BegunSession } from '../auth/sessions.ts';
import { authSettings } from '../auth/settings.ts';
import { database } from '../db/client.ts';
import { person } from '../db/schema/people.ts';
import { NotFound } from '../errors.ts';

/** Signs in as a demo account without any proof. @throws NotFound outside demo mode and for any other account */
export async function signInAs(key: string, browser: string): Promise<BegunSession> {
	const absent = () => new NotFound('There is no such demo account.');
	if (!authSettings().demo) throw absent();
	return database().transaction(async (tx) => {
		const [found] = await tx
			.select({ id: person.id })
			.from(person)
			.where(and(eq(person.demo, key), eq(person.state, 'active')));
		if (!found) throw absent();
		return begin(tx, { personId: found.id, begunBy: 'demo', browser });
	});
}
