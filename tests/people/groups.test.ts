import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { aRequest, gold, post } from '../support/force-requests.ts';
import { linkIn } from '../support/mail.ts';
import { startPeopleServer } from '../support/people-server.ts';
import { signedInAs, visitor, whoIs, type Visitor } from '../support/visitor.ts';

let server: Awaited<ReturnType<typeof startPeopleServer>>;
let client = 0;

beforeAll(async () => {
	server = await startPeopleServer();
}, 180_000);
afterAll(() => server.stop());

const enter = (account: string) => signedInAs(server.origin, account, `198.51.100.${++client}`);
const somebody = () => visitor(server.origin, `198.51.100.${++client}`);

async function codeOf(email: string, count = 1): Promise<string> {
	const mail = await server.mail.waitFor(email, count);
	return new URL(linkIn(mail)).searchParams.get('code') ?? '';
}

const idOf = async (account: string) =>
	(await server.sql<{ id: string }[]>`select id from person where demo = ${account}`)[0].id;

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

describe('an invitation', () => {
	it('brings somebody in with the role and the group that it names', async () => {
		const lead = await enter('lead');
		const email = 'guest@larkmoor.example';
		const sent = await lead.form('/account/groups/cantilevers?/invite', { email, role: 'researcher' });
		expect(sent.status).toBe(200);
		const code = await codeOf(email);
		const guest = somebody();
		const page = await (await guest.get(`/invitation?code=${code}`)).text();
		expect(page).toContain('as researcher, in the group Cantilevers');
		expect(await whoIs(guest)).toBeNull();
		expect((await guest.form('/invitation', { code, name: 'Guest of the lab' })).status).toBe(303);
		expect(await whoIs(guest)).toBe('Guest of the lab');
		expect((await guest.get('/account/groups/cantilevers')).status).toBe(200);
		// It was for once.
		expect((await somebody().form('/invitation', { code, name: 'Another' })).status).toBe(404);
	});

	it.each([
		['an administrator', { role: 'administrator' }],
		['a curator', { role: 'curator' }],
		['a lead', { role: 'researcher', lead: 'on' }]
	])('of %s is not a lead’s to give', async (_who, fields) => {
		const lead = await enter('lead');
		const email = `more-${client}@larkmoor.example`;
		const answer = await lead.form('/account/groups/cantilevers?/invite', { email, ...fields });
		// The field "lead" is not one of this form: it is ignored, and the invitation is for a member.
		expect(answer.status).toBe('lead' in fields ? 200 : 403);
		const made = await server.sql<{ role: string; lead: boolean }[]>`
			select role, lead from invitation where email = ${email}`;
		expect(made).toEqual('lead' in fields ? [{ role: 'researcher', lead: false }] : []);
	});

	it('cannot be used after it was taken back or has expired', async () => {
		const administrator = await enter('administrator');
		for (const [email, how] of [
			['taken-back@larkmoor.example', 'revoked'],
			['too-old@larkmoor.example', 'expired']
		]) {
			await administrator.form('/administration/invitations?/invite', { email, role: 'reader', group: '' });
			const code = await codeOf(email);
			const [{ id }] = await server.sql<{ id: string }[]>`select id from invitation where email = ${email}`;
			if (how === 'revoked') {
				const answer = await administrator.form('/administration/invitations?/revoke', { invitation: id });
				expect(answer.status).toBe(200);
			} else {
				await server.sql.begin(async (sql) => {
					await sql`update invitation set expires_at = created_at where id = ${id}`;
					await sql`insert into audit_entry (actor, action, object_type, object_id, details)
						values ('installation', 'invitation.test', 'invitation', ${id}, '{}')`;
				});
			}
			expect((await somebody().form('/invitation', { code, name: 'Late' })).status).toBe(404);
			expect(await server.sql`select from person where email = ${email}`).toHaveLength(0);
		}
	});

	it('changes no role of an account that exists', async () => {
		const administrator = await enter('administrator');
		const email = 'reader@larkmoor.example';
		const [{ id: group }] = await server.sql`select id from "group" where slug = 'wet-films'`;
		await administrator.form('/administration/invitations?/invite', {
			email,
			role: 'administrator',
			group: String(group)
		});
		const reader = somebody();
		expect((await reader.form('/invitation', { code: await codeOf(email), name: '' })).status).toBe(303);
		const [{ role }] = await server.sql`select role from person where email = ${email}`;
		expect(role).toBe('reader');
		expect((await reader.get('/account/groups/wet-films')).status).toBe(200);
		expect((await reader.get('/administration')).status).toBe(403);
	});
});

describe('a group', () => {
	it('does not exist for those who are not in it, whatever they try', async () => {
		const outsider = await enter('researcher-2');
		const member = await idOf('researcher');
		const absent = await outsider.get('/account/groups/not-there-at-all');
		const hidden = await outsider.get('/account/groups/cantilevers');
		expect([absent.status, hidden.status]).toEqual([404, 404]);
		const plain = async (answer: Response) =>
			(await answer.text())
				.replace(/not-there-at-all|cantilevers/g, '')
				.replace(/nonce="[^"]*"|__sveltekit_\w+/g, '');
		expect(await plain(hidden)).toBe(await plain(absent));
		for (const [action, fields] of [
			['invite', { email: 'friend@larkmoor.example', role: 'reader' }],
			['remove', { person: member }],
			['lead', { person: member, lead: 'yes' }],
			['rename', { name: 'Taken over' }],
			['revoke', { invitation: '00000000-0000-4000-8000-000000000000' }]
		] as const) {
			const answer = await outsider.form(`/account/groups/cantilevers?/${action}`, fields);
			expect([action, answer.status]).toEqual([action, 404]);
		}
	});

	it('is changed by its leads and not by its members', async () => {
		const member = await enter('researcher');
		const other = await idOf('curator');
		for (const [action, fields] of [
			['invite', { email: 'friend@larkmoor.example', role: 'reader' }],
			['remove', { person: other }],
			['lead', { person: other, lead: 'yes' }],
			['rename', { name: 'Taken over' }]
		] as const) {
			const answer = await member.form(`/account/groups/cantilevers?/${action}`, fields);
			expect([action, answer.status]).toEqual([action, 403]);
		}
		const lead = await enter('lead');
		expect((await lead.form('/account/groups/cantilevers?/remove', { person: other })).status).toBe(200);
		expect((await lead.form('/account/groups/wet-films?/rename', { name: 'Mine now' })).status).toBe(404);
	});

	it('shows no canary of its own to anybody outside, on any page or in any list', async () => {
		const group = 'cantilevers';
		const canaries = Array.from(
			{ length: 40 },
			(_none, index) => `canary-${index}-${Math.random().toString(36).slice(2)}`
		);
		const lead = await enter('lead');
		const [name, ...rest] = canaries;
		expect((await lead.form(`/account/groups/${group}?/rename`, { name })).status).toBe(200);
		const [ofTokens, ofMail] = [rest.slice(0, 19), rest.slice(19)];
		for (const canary of ofTokens) {
			const made = await lead.form('/account/tokens?/create', { name: canary, scopes: 'read', days: '1' });
			expect(made.status).toBe(200);
		}
		for (const canary of ofMail) {
			const email = `${canary}@larkmoor.example`;
			expect((await lead.form(`/account/groups/${group}?/invite`, { email, role: 'reader' })).status).toBe(
				200
			);
		}
		const own = await (await lead.get(`/account/groups/${group}`)).text();
		expect(own).toContain(name);
		expect(own).toContain(ofMail[0]);
		expect(await (await lead.get('/account/tokens')).text()).toContain(ofTokens[0]);

		const outsiders = [
			somebody(),
			await enter('reader-2'),
			await enter('researcher-2'),
			await enter('curator-2')
		];
		const pages = [
			'/',
			'/library',
			`/library?search=${name}`,
			'/account',
			'/account/sessions',
			'/account/tokens',
			'/account/data.json',
			'/account/groups/cantilevers',
			'/account/groups/wet-films',
			'/administration/invitations',
			'/administration/tokens',
			'/administration/groups',
			'/administration/outbox',
			'/administration/audit',
			'/administration/audit.csv',
			'/api/v1/tokens',
			'/api/v1/openapi.json',
			`/api/v1/materials?search=${name}`
		];
		const leaks: string[] = [];
		let read = 0;
		for (const outsider of outsiders) {
			for (const page of pages.flatMap((path) => [path, `${path.split('?')[0]}/__data.json`])) {
				const answer = await outsider.get(page);
				const seen = `${await answer.text()} ${JSON.stringify([...answer.headers])}`.replaceAll(
					`search=${name}`,
					''
				);
				read += 1;
				const asked = page.includes(name) ? canaries.slice(1) : canaries;
				leaks.push(
					...asked.filter((canary) => seen.includes(canary)).map((canary) => `${canary} at ${page}`)
				);
			}
		}
		expect(leaks).toEqual([]);
		expect(read).toBeGreaterThan(100);
	}, 60_000);
});

describe('losing access', () => {
	it('ends sessions and tokens at the next request', async () => {
		const person = await enter('researcher-2');
		const { secret } = await tokenOf(person);
		expect((await byToken(secret)).status).toBe(200);
		const administrator = await enter('administrator');
		const id = await idOf('researcher-2');
		expect((await administrator.form(`/administration/people/${id}?/remove`, {})).status).toBe(200);
		expect(await whoIs(person)).toBeNull();
		expect((await byToken(secret)).status).toBe(401);
		const mail = await server.mail.waitFor('researcher-2@larkmoor.example', 2);
		expect(mail.subject).toBe('Your access to Hairsbreadth has ended');
		await administrator.form(`/administration/people/${id}?/readmit`, {});
		// The old ones stay dead.
		expect(await whoIs(person)).toBeNull();
		expect((await byToken(secret)).status).toBe(401);
	});

	it('cuts a stream that is under way within five seconds', async () => {
		const person = await enter('curator-2');
		const { secret } = await tokenOf(person, ['compute']);
		const headers = {
			authorization: `Bearer ${secret}`,
			accept: 'application/x-ndjson',
			'x-test-client': '192.0.2.7'
		};
		const asking = (count: number) =>
			post(
				server.origin,
				aRequest((request) => {
					request.arrangement.temperatureK = 1;
					const layers = Array.from({ length: 40 }, () => ({ of: gold, thicknessNm: 5 }));
					request.arrangement.left.layers = layers;
					request.arrangement.right.layers = layers;
					request.separationsNm = { from: 10, to: 5000, count, spacing: 'log' };
					request.relativeAccuracy = 1e-10;
				}),
				headers
			);
		// As long as is computed at all: the refusal of more says how long that would take.
		let count = 2000;
		let answer = await asking(count);
		for (let attempt = 0; answer.status === 422 && attempt < 4; attempt += 1) {
			const { error } = (await answer.json()) as { error: { message: string } };
			const seconds = Number(/about (\d+) s/.exec(error.message)?.[1]);
			count = Math.floor((count * 26) / seconds);
			answer = await asking(count);
		}
		expect(answer.status).toBe(200);
		const reader = answer.body?.getReader();
		await reader?.read();
		const administrator = await enter('administrator');
		await administrator.form(`/administration/people/${await idOf('curator-2')}?/remove`, {});
		const removedAt = performance.now();
		let text = '';
		try {
			for (;;) {
				const piece = await reader?.read();
				if (!piece || piece.done) break;
				text += new TextDecoder().decode(piece.value);
			}
		} catch {
			// A cut stream ends with an error of the connection.
		}
		expect(performance.now() - removedAt).toBeLessThan(5000);
		expect(text.includes('"type":"end"')).toBe(false);
	}, 60_000);

	it('ends the sessions of a changed role', async () => {
		const person = await enter('curator');
		const administrator = await enter('administrator');
		const id = await idOf('curator');
		expect((await administrator.form(`/administration/people/${id}?/role`, { role: 'reader' })).status).toBe(
			200
		);
		expect(await whoIs(person)).toBeNull();
		await administrator.form(`/administration/people/${id}?/role`, { role: 'curator' });
	});

	it('is not possible for the last administrator', async () => {
		const administrator = await enter('administrator');
		const [own, second] = [await idOf('administrator'), await idOf('administrator-2')];
		expect((await administrator.form(`/administration/people/${second}?/remove`, {})).status).toBe(200);
		const last = await administrator.form(`/administration/people/${own}?/remove`, {});
		expect(last.status).toBe(409);
		expect((await administrator.form(`/administration/people/${own}?/role`, { role: 'reader' })).status).toBe(
			409
		);
		expect(
			(await administrator.form('/account/data?/delete', { email: 'administrator@larkmoor.example' })).status
		).toBe(409);
		expect(await whoIs(administrator)).toBe('Larkmoor administrator');
	});

	it('by deleting the account removes what is personal and keeps the name', async () => {
		const person = await enter('reader-2');
		const id = await idOf('reader-2');
		expect((await person.form('/account/data?/delete', { email: 'wrong@larkmoor.example' })).status).toBe(
			422
		);
		expect((await person.form('/account/data?/delete', { email: 'reader-2@larkmoor.example' })).status).toBe(
			303
		);
		expect(await whoIs(person)).toBeNull();
		await server.mail.waitFor('reader-2@larkmoor.example');
		await new Promise((resolve) => setTimeout(resolve, 300));
		const [row] = await server.sql`select name, email, state, preferences from person where id = ${id}`;
		expect(row).toEqual({ name: 'Larkmoor reader 2', email: null, state: 'deleted', preferences: {} });
		const [{ left }] = await server.sql<{ left: string }[]>`
			select (select count(*) from outbox as one where one::text like '%reader-2@larkmoor%')
				+ (select count(*) from invitation as one where one::text like '%reader-2@larkmoor%')
				+ (select count(*) from sign_in_link as one where one::text like '%reader-2@larkmoor%')
				+ (select count(*) from audit_entry as one where one::text like '%reader-2@larkmoor%') as left`;
		expect(Number(left)).toBe(0);
	});
});
