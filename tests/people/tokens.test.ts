import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startPeopleServer } from '../support/people-server.ts';
import { signedInAs, whoIs, type Visitor } from '../support/visitor.ts';

let server: Awaited<ReturnType<typeof startPeopleServer>>;
let client = 0;

beforeAll(async () => {
	server = await startPeopleServer();
}, 180_000);
afterAll(() => server.stop());

const enter = (account: string) => signedInAs(server.origin, account, `198.51.100.${++client}`);

async function tokenOf(person: Visitor, scopes = ['read']): Promise<{ secret: string; id: string }> {
	const answer = await person.request('/api/v1/tokens', {
		method: 'POST',
		body: JSON.stringify({ name: 'for a test', scopes, days: 1 }),
		headers: { 'content-type': 'application/json' }
	});
	const { secret, token } = (await answer.json()) as { secret: string; token: { id: string } };
	return { secret, id: token.id };
}

const byToken = (secret: string) =>
	fetch(`${server.origin}/api/v1/tokens`, { headers: { authorization: `Bearer ${secret}` } });

describe('a form', () => {
	it('sets no field that is not its own', async () => {
		const person = await enter('researcher');
		const before =
			await server.sql`select role, state, email, role_from, demo from person where demo = 'researcher'`;
		const fields = {
			name: 'Renamed',
			role: 'administrator',
			state: 'removed',
			email: 'x@larkmoor.example',
			id: '1',
			roleFrom: 'institution'
		};
		expect((await person.form('/account?/profile', fields)).status).toBe(200);
		expect(
			await server.sql`select role, state, email, role_from, demo from person where demo = 'researcher'`
		).toEqual(before);
		expect(await whoIs(person)).toBe('Renamed');
		for (const more of [{ personId: 'x' }, { secretHash: 'x' }, { createdAt: '2020-01-01' }]) {
			const answer = await person.request('/api/v1/tokens', {
				method: 'POST',
				body: JSON.stringify({ name: 'more', scopes: ['read'], days: 1, ...more }),
				headers: { 'content-type': 'application/json' }
			});
			expect(answer.status).toBe(422);
		}
	});

	it.each([
		[{ name: 'a', scopes: ['admin'], days: 1 }],
		[{ name: 'a', scopes: [], days: 1 }],
		[{ name: 'a', scopes: ['read'], days: 366 }],
		[{ name: 'a', scopes: ['read'], days: 0 }],
		[{ name: '', scopes: ['read'], days: 1 }]
	])('refuses the token %j', async (wanted) => {
		const person = await enter('researcher');
		const answer = await person.request('/api/v1/tokens', {
			method: 'POST',
			body: JSON.stringify(wanted),
			headers: { 'content-type': 'application/json' }
		});
		expect(answer.status).toBe(422);
	});
});

describe('a token', () => {
	it('is 256 bits, kept as a hash, and works in the header alone', async () => {
		const person = await enter('lead');
		const { secret, id } = await tokenOf(person);
		expect(Buffer.from(secret.slice(3), 'base64url')).toHaveLength(32);
		const hits =
			await server.sql`select from api_token as one where one::text like ${`%${secret.slice(12)}%`}`;
		expect(hits).toHaveLength(0);
		for (const place of [
			`?token=${secret}`,
			`?access_token=${secret}`,
			`?authorization=Bearer%20${secret}`
		]) {
			expect((await fetch(`${server.origin}/api/v1/tokens${place}`)).status).toBe(401);
		}
		const other = await enter('researcher');
		expect((await other.request(`/api/v1/tokens/${id}`, { method: 'DELETE' })).status).toBe(404);
		const administrator = await enter('administrator');
		expect((await administrator.request(`/api/v1/tokens/${id}`, { method: 'DELETE' })).status).toBe(404);
		expect((await byToken(secret)).status).toBe(200);
		const [{ used }] =
			await server.sql`select last_used_at is not null as used from api_token where id = ${id}`;
		expect(used).toBe(true);
		expect((await person.request(`/api/v1/tokens/${id}`, { method: 'DELETE' })).status).toBe(204);
		expect((await byToken(secret)).status).toBe(401);
	});

	it('expires', async () => {
		const person = await enter('lead');
		const { secret, id } = await tokenOf(person);
		await server.sql.begin(async (sql) => {
			await sql`update api_token set expires_at = now() - interval '1 second' where id = ${id}`;
			await sql`insert into audit_entry (actor, action, object_type, object_id, details)
				values ('installation', 'token.test', 'token', ${id}, '{}')`;
		});
		expect((await byToken(secret)).status).toBe(401);
	});

	it('is limited to 600 requests an hour', async () => {
		const person = await enter('lead');
		const { secret, id } = await tokenOf(person);
		expect((await byToken(secret)).status).toBe(200);
		await server.sql`update rate_counter set used = 600 where key = ${`token:${id}`}`;
		const answer = await byToken(secret);
		expect(answer.status).toBe(429);
		expect(Number(answer.headers.get('retry-after'))).toBeGreaterThan(0);
	});
});
