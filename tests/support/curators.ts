import type { SignedIn } from '../../src/lib/schemas/person.ts';
import { DEMO_ACCOUNTS } from '../../src/lib/server/demo/accounts.ts';
import { seedDemo } from '../../src/lib/server/demo/seed.ts';
import { database } from '../../src/lib/server/db/client.ts';
import { person } from '../../src/lib/server/db/schema/people.ts';
import { signedIn } from '../../src/lib/server/people/signed-in.ts';

/** The people of the demonstration, as the services know them. */
export async function demoPeople(): Promise<Record<string, SignedIn>> {
	await seedDemo();
	const rows = await database().select({ id: person.id, demo: person.demo }).from(person);
	const people: Record<string, SignedIn> = {};
	for (const { key } of DEMO_ACCOUNTS) {
		const row = rows.find(({ demo }) => demo === key);
		const known = row && (await signedIn(database(), row.id));
		if (known) people[key] = known;
	}
	return people;
}

type Handler = (event: never) => Response | Promise<Response>;

/** Calls a handler of the API as the router would, for somebody whom the policy table has let through. */
export async function call(
	handler: Handler,
	actor: SignedIn | null,
	params: Record<string, string>,
	init: RequestInit = {}
): Promise<Response> {
	const url = new URL('http://localhost:4173/api/v1/under-test');
	const principal = actor ? { kind: 'session', person: actor, sessionId: 'x' } : { kind: 'nobody' };
	return handler({ request: new Request(url, init), url, params, locals: { principal } } as never);
}

export const asJson = (body: unknown, headers: Record<string, string> = {}): RequestInit => ({
	method: 'POST',
	headers: { 'content-type': 'application/json', ...headers },
	body: JSON.stringify(body)
});

export function asForm(
	file: string | Uint8Array<ArrayBuffer>,
	description: unknown,
	{ name = 'table.csv', headers = {} }: { name?: string; headers?: Record<string, string> } = {}
): RequestInit {
	const form = new FormData();
	form.set('file', new File([file], name));
	form.set('description', typeof description === 'string' ? description : JSON.stringify(description));
	return { method: 'POST', body: form, headers };
}
