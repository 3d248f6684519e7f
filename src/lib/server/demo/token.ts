import { eq } from 'drizzle-orm';
import type { Role } from '../../schemas/person.ts';
import { SCOPES } from '../../schemas/token.ts';
import { database } from '../db/client.ts';
import { person } from '../db/schema/people.ts';
import { signedIn } from '../people/signed-in.ts';
import { create } from '../people/tokens.ts';
import { demoAccount } from './accounts.ts';

const DAYS = 7;

/** Makes a token of a demo account with every scope: its role decides what that amounts to. */
export async function demoToken(role: Role, second: boolean): Promise<string> {
	const { key } = demoAccount(role, second);
	const [found] = await database().select({ id: person.id }).from(person).where(eq(person.demo, key));
	const owner = found ? await signedIn(database(), found.id) : null;
	if (!owner)
		throw new Error(`The demo account ${key} is not there. Start the application in demo mode once.`);
	const { secret } = await create(owner, { name: 'demo:token', scopes: [...SCOPES], days: DAYS });
	return secret;
}
