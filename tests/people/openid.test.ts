import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { freePort } from '../../src/launch/free-port.mjs';
import { CLIENT, openInstitution, type Institution, type InstitutionAccount } from '../support/openid.ts';
import { startPeopleServer } from '../support/people-server.ts';
import { signedInAs, visitor, whoIs, type Visitor } from '../support/visitor.ts';

let server: Awaited<ReturnType<typeof startPeopleServer>>;
let institution: Institution;
let issuer: string;

beforeAll(async () => {
	const port = await freePort();
	issuer = `http://127.0.0.1:${port}`;
	server = await startPeopleServer({
		HAIRSBREADTH_OIDC_ISSUER: issuer,
		HAIRSBREADTH_OIDC_CLIENT_ID: CLIENT.id,
		HAIRSBREADTH_OIDC_CLIENT_SECRET: CLIENT.secret,
		HAIRSBREADTH_OIDC_NAME: 'Larkmoor Institute',
		HAIRSBREADTH_OIDC_SCOPES: 'openid email profile groups',
		HAIRSBREADTH_OIDC_ROLES: JSON.stringify({ 'gap-work': 'researcher', 'gap-data': 'curator' })
	});
	institution = await openInstitution(port, server.origin);
}, 180_000);
afterAll(async () => {
	await institution.close();
	await server.stop();
});

const account = (change: Partial<InstitutionAccount>): InstitutionAccount => ({
	sub: 'institute-1',
	email: 'newcomer@larkmoor.example',
	email_verified: true,
	name: 'Larkmoor newcomer',
	groups: ['gap-work'],
	...change
});

/** What the page that goes on to the institution names. */
async function onwardFrom(answer: Response): Promise<string> {
	expect(answer.status).toBe(200);
	const text = await answer.text();
	const found = /http-equiv="refresh" content="0;url=([^"]+)"/.exec(text)?.[1];
	if (!found) throw new Error('The page does not lead to the institution.');
	return found.replaceAll('&amp;', '&');
}

/** Through the provider, until it sends back here. @returns the address that it sends to */
async function throughProvider(start: string): Promise<string> {
	const atProvider = visitor(issuer);
	let next = start;
	for (let step = 0; step < 8; step += 1) {
		if (next.startsWith(server.origin)) return next;
		const answer = await atProvider.request(next);
		const location = answer.headers.get('location');
		if (!location) throw new Error(`The provider stopped with ${answer.status}: ${await answer.text()}`);
		next = new URL(location, next).href;
	}
	throw new Error('The provider went in circles.');
}

async function signIn(person: Visitor, who: InstitutionAccount): Promise<string> {
	institution.becomes(who);
	const back = await throughProvider(await onwardFrom(await person.form('/sign-in?/institution', {})));
	const answer = await person.get(back);
	expect(answer.status).toBe(303);
	return answer.headers.get('location') ?? '';
}

const roleOf = async (email: string) => {
	const [row] = await server.sql<{ role: string }[]>`select role from person where email = ${email}`;
	return row?.role;
};

describe('signing in through the institution', () => {
	it('makes an account with the role that its groups are mapped to', async () => {
		const person = visitor(server.origin);
		expect(await signIn(person, account({}))).toBe('/');
		expect(await whoIs(person)).toBe('Larkmoor newcomer');
		expect(await roleOf('newcomer@larkmoor.example')).toBe('researcher');
	});

	it('finds the account again and follows the groups of the day', async () => {
		const person = visitor(server.origin);
		await signIn(person, account({ groups: ['gap-work', 'gap-data', 'cooks'] }));
		expect(await whoIs(person)).toBe('Larkmoor newcomer');
		expect(await roleOf('newcomer@larkmoor.example')).toBe('curator');
		const again = visitor(server.origin);
		await signIn(again, account({}));
		expect(await roleOf('newcomer@larkmoor.example')).toBe('researcher');
		// The session of the higher role is over.
		expect(await whoIs(person)).toBeNull();
		const [{ accounts }] = await server.sql<{ accounts: string }[]>`
			select count(*) as accounts from person where email = 'newcomer@larkmoor.example'`;
		expect(Number(accounts)).toBe(1);
	});

	it('lets nobody in whose groups are not on the list, not even one who was let in before', async () => {
		const stranger = visitor(server.origin);
		const groups = ['cooks', 'administrator', 'toString'];
		expect(
			await signIn(stranger, account({ sub: 'institute-2', email: 'cook@larkmoor.example', groups }))
		).toBe('/sign-in?problem=no-group');
		expect(await whoIs(stranger)).toBeNull();
		expect(await roleOf('cook@larkmoor.example')).toBeUndefined();
		const former = visitor(server.origin);
		expect(await signIn(former, account({ groups: [] }))).toBe('/sign-in?problem=no-group');
		expect(await whoIs(former)).toBeNull();
	});

	it('makes no account for an address that the institution does not vouch for', async () => {
		const person = visitor(server.origin);
		const claim = account({ sub: 'institute-3', email: 'claimed@larkmoor.example', email_verified: false });
		expect(await signIn(person, claim)).toBe('/sign-in?problem=unverified');
		expect(await roleOf('claimed@larkmoor.example')).toBeUndefined();
	});

	it('keeps no token of the institution', async () => {
		const [{ columns }] = await server.sql<{ columns: string[] }[]>`
			select array_agg(column_name::text order by column_name::text) as columns
			from information_schema.columns where table_name = 'account_link'`;
		expect(columns).toEqual(['created_at', 'person_id', 'provider', 'subject']);
	});

	it('does not accept the return without the cookies of the browser that set out', async () => {
		institution.becomes(account({}));
		const person = visitor(server.origin);
		const back = await throughProvider(await onwardFrom(await person.form('/sign-in?/institution', {})));
		const thief = visitor(server.origin);
		expect((await thief.get(back)).headers.get('location')).toBe('/sign-in?problem=institution');
		expect(await whoIs(thief)).toBeNull();
		// Nor with another state than the one that it left with.
		const forged = new URL(back);
		forged.searchParams.set('state', 'forged');
		expect((await person.get(forged.href)).headers.get('location')).toBe('/sign-in?problem=institution');
		expect(await whoIs(person)).toBeNull();
	});
});

describe('linking the institution to an account', () => {
	const reader = account({ sub: 'institute-9', email: 'reader@larkmoor.example', groups: ['gap-data'] });

	it('is not done by having the same address', async () => {
		const person = visitor(server.origin);
		expect(await signIn(person, reader)).toBe('/sign-in?problem=not-linked');
		expect(await whoIs(person)).toBeNull();
	});

	it('is not done by coming back into somebody’s browser without their pressing the button', async () => {
		const victim = visitor(server.origin);
		institution.becomes(account({ sub: 'institute-attacker', email: 'other@larkmoor.example' }));
		const back = await throughProvider(await onwardFrom(await victim.form('/sign-in?/institution', {})));
		await victim.form('/sign-in?/demo', { account: 'reader-2' });
		await victim.get(back);
		const links = await server.sql`
			select from account_link join person on person.id = person_id where demo = 'reader-2'`;
		expect(links).toHaveLength(0);
	});

	it('is done by the button, told by mail, and changes no role', async () => {
		const person = await signedInAs(server.origin, 'reader');
		institution.becomes(reader);
		const back = await throughProvider(await onwardFrom(await person.form('/account?/link', {})));
		expect((await person.get(back)).headers.get('location')).toBe('/account');
		const mail = await server.mail.waitFor('reader@larkmoor.example');
		expect(mail.subject).toBe('Your Hairsbreadth account has a new way in');
		const elsewhere = visitor(server.origin);
		expect(await signIn(elsewhere, reader)).toBe('/');
		expect(await whoIs(elsewhere)).toBe('Larkmoor reader');
		expect(await roleOf('reader@larkmoor.example')).toBe('reader');
	});

	it('gives no second account the same link', async () => {
		const person = await signedInAs(server.origin, 'curator');
		institution.becomes(reader);
		const back = await throughProvider(await onwardFrom(await person.form('/account?/link', {})));
		expect((await person.get(back)).headers.get('location')).toBe('/account?problem=linked-elsewhere');
	});

	it('can be undone', async () => {
		const person = await signedInAs(server.origin, 'reader');
		expect((await person.form('/account?/unlink', {})).status).toBe(200);
		const elsewhere = visitor(server.origin);
		expect(await signIn(elsewhere, reader)).toBe('/sign-in?problem=not-linked');
	});
});
