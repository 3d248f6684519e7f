import { beforeAll, describe, expect, it } from 'vitest';
import type { SignedIn } from '../../src/lib/schemas/person.ts';
import { useDatabase } from '../support/database.ts';

/** The guards of the services themselves, which stand whatever a route forgets. */

const database = useDatabase();
const ABSENT = '00000000-0000-4000-8000-000000000000';

async function load() {
	return {
		db: await import('../../src/lib/server/db/client.ts'),
		people: await import('../../src/lib/server/people/people.ts'),
		groups: await import('../../src/lib/server/people/groups.ts'),
		invitations: await import('../../src/lib/server/people/invitations.ts'),
		tokens: await import('../../src/lib/server/people/tokens.ts'),
		installation: await import('../../src/lib/server/people/installation.ts'),
		health: await import('../../src/lib/server/people/health.ts'),
		sessions: await import('../../src/lib/server/auth/sessions.ts'),
		principal: await import('../../src/lib/server/auth/principal.ts'),
		stillIn: await import('../../src/lib/server/auth/still-in.ts'),
		intent: await import('../../src/lib/server/auth/link-intent.ts'),
		signedIn: (await import('../../src/lib/server/people/signed-in.ts')).signedIn
	};
}

let s: Awaited<ReturnType<typeof load>>;
const actors: Record<string, SignedIn> = {};
const groups: Record<string, string> = {};

beforeAll(async () => {
	process.env.HAIRSBREADTH_SECRET = Buffer.alloc(32, 7).toString('base64');
	s = await load();
	const { seedDemo } = await import('../../src/lib/server/demo/seed.ts');
	await seedDemo();
	for (const { id, demo } of await database.sql`select id, demo from person`) {
		const person = await s.signedIn(s.db.database(), id);
		if (person) actors[demo] = person;
	}
	for (const { id, slug } of await database.sql`select id, slug from "group"`) groups[slug] = id;
});

type Refusal = 'Forbidden' | 'NotFound';

describe('what is the administrator’s alone', () => {
	const calls: [string, (actor: SignedIn) => Promise<unknown>][] = [
		['to list people', (actor) => s.people.list(actor, {})],
		['to look at a person', (actor) => s.people.get(actor, actors.reader.id)],
		['to change a role', (actor) => s.people.setRole(actor, actor.id, 'administrator')],
		['to end access', (actor) => s.people.removePerson(actor, actors['reader-2'].id)],
		['to give access back', (actor) => s.people.readmit(actor, actors['reader-2'].id)],
		['to list groups', (actor) => s.groups.list(actor)],
		['to make a group', (actor) => s.groups.create(actor, { name: 'Own group', slug: 'own-group' })],
		['to close a group', (actor) => s.groups.close(actor, groups.cantilevers)],
		['to reopen a group', (actor) => s.groups.reopen(actor, groups.cantilevers)],
		[
			'to add somebody without asking',
			(actor) => s.groups.add(actor, { groupId: groups.cantilevers, personId: actor.id, lead: true })
		],
		['to list all tokens', (actor) => s.tokens.listAll(actor, {})],
		['to revoke anybody’s token', (actor) => s.tokens.revokeAnybodys(actor, ABSENT)],
		['to change the settings', (actor) => s.installation.change(actor, { publicReading: true })],
		['to look at the health', (actor) => s.health.health(actor)]
	];

	it.each(calls)('is %s', async (_what, call) => {
		for (const who of ['reader', 'researcher', 'lead', 'curator', 'curator-2']) {
			await expect(call(actors[who]), who).rejects.toMatchObject({ name: 'Forbidden' });
		}
	});
});

describe('what is a lead’s', () => {
	const member = () => actors.curator.id;
	const calls: [string, (actor: SignedIn) => Promise<unknown>][] = [
		['to rename the group', (actor) => s.groups.rename(actor, groups.cantilevers, 'Levers')],
		['to remove a member', (actor) => s.groups.remove(actor, groups.cantilevers, member())],
		[
			'to name a lead',
			(actor) => s.groups.setLead(actor, { groupId: groups.cantilevers, personId: member(), lead: true })
		],
		[
			'to invite',
			(actor) =>
				s.invitations.invite(actor, {
					email: 'guest@larkmoor.example',
					role: 'reader',
					groupId: groups.cantilevers,
					lead: false
				})
		]
	];

	it.each(calls)('is %s, not a member’s, and hidden from others', async (_what, call) => {
		await expect(call(actors.researcher)).rejects.toMatchObject({ name: 'Forbidden' });
		for (const outsider of ['researcher-2', 'curator-2', 'reader']) {
			await expect(call(actors[outsider]), outsider).rejects.toMatchObject({ name: 'NotFound' });
		}
	});

	it.each([
		['a curator', { role: 'curator' as const, lead: false }, 'Forbidden'],
		['an administrator', { role: 'administrator' as const, lead: false }, 'Forbidden'],
		['a lead', { role: 'researcher' as const, lead: true }, 'Forbidden']
	] satisfies [string, object, Refusal][])('does not reach to inviting %s', async (_who, wanted, name) => {
		const invitation = { email: 'guest@larkmoor.example', groupId: groups.cantilevers, ...wanted };
		await expect(s.invitations.invite(actors.lead, invitation)).rejects.toMatchObject({ name });
		const nowhere = { email: 'guest@larkmoor.example', role: 'reader' as const, groupId: null, lead: false };
		await expect(s.invitations.invite(actors.lead, nowhere)).rejects.toMatchObject({ name });
	});

	it('is to see and take back the invitations of the own group only', async () => {
		const wanted = { email: 'guest@larkmoor.example', role: 'reader' as const, lead: false };
		const id = await s.invitations.invite(actors.lead, { ...wanted, groupId: groups.cantilevers });
		for (const who of ['curator-2', 'researcher', 'reader']) {
			expect((await s.invitations.list(actors[who], {})).invitations, who).toEqual([]);
			await expect(s.invitations.revoke(actors[who], id), who).rejects.toMatchObject({ name: 'NotFound' });
		}
		expect((await s.invitations.list(actors.lead, {})).invitations).toHaveLength(1);
		await s.invitations.revoke(actors.lead, id);
		await expect(s.invitations.revoke(actors.lead, id)).rejects.toMatchObject({ name: 'StateError' });
	});
});

describe('a group', () => {
	it('is seen by its members and administrators', async () => {
		await expect(s.groups.get(actors['researcher-2'], 'cantilevers')).rejects.toMatchObject({
			name: 'NotFound'
		});
		await expect(s.groups.leave(actors['researcher-2'], groups.cantilevers)).rejects.toMatchObject({
			name: 'NotFound'
		});
		const seen = await s.groups.get(actors.researcher, 'cantilevers');
		// Addresses are for those who manage it.
		expect(seen.people.every(({ email }) => email === null)).toBe(true);
		expect((await s.groups.get(actors.lead, 'cantilevers')).people.every(({ email }) => email !== null)).toBe(
			true
		);
		expect((await s.groups.get(actors.administrator, 'cantilevers')).managed).toBe(true);
	});

	it('takes nobody in while it is closed', async () => {
		await s.groups.close(actors.administrator, groups['wet-films']);
		const wanted = { email: 'guest@larkmoor.example', role: 'reader' as const, lead: false };
		await expect(
			s.invitations.invite(actors.administrator, { ...wanted, groupId: groups['wet-films'] })
		).rejects.toMatchObject({ name: 'NotFound' });
		await expect(
			s.groups.add(actors.administrator, {
				groupId: groups['wet-films'],
				personId: actors.reader.id,
				lead: false
			})
		).rejects.toMatchObject({ name: 'StateError' });
		await s.groups.reopen(actors.administrator, groups['wet-films']);
	});
});

describe('a session and a token', () => {
	const begin = (account: string) =>
		s.db
			.database()
			.transaction((tx) =>
				s.sessions.begin(tx, { personId: actors[account].id, begunBy: 'demo', browser: 'test' })
			);
	const make = (account: string) =>
		s.tokens.create(actors[account], { name: 'test', scopes: ['read'], days: 1 });

	it('are one’s own to end', async () => {
		const { id, secret } = await begin('researcher');
		await expect(s.sessions.end(actors.lead.id, id)).rejects.toMatchObject({ name: 'NotFound' });
		expect(await s.sessions.find(secret)).not.toBeNull();
		const { token, secret: tokenSecret } = await make('researcher');
		await expect(s.tokens.revokeOwn(actors.administrator, token.id)).rejects.toMatchObject({
			name: 'NotFound'
		});
		expect(await s.tokens.find(tokenSecret)).not.toBeNull();
	});

	it.each([
		['idle for a day', `update session set last_seen_at = now() - interval '24 hours 1 minute'`],
		[
			'thirty days old',
			`update session set created_at = now() - interval '31 days', expires_at = now() - interval '1 day'`
		]
	])('end when %s', async (_when, change) => {
		const { secret } = await begin('lead');
		expect(await s.sessions.find(secret)).not.toBeNull();
		await database.sql.unsafe(change);
		expect(await s.sessions.find(secret)).toBeNull();
	});

	it('are nothing once revoked, and nothing of a removed person', async () => {
		const revoked = await make('reader-2');
		await s.tokens.revokeOwn(actors['reader-2'], revoked.token.id);
		expect(await s.tokens.find(revoked.secret)).toBeNull();
		const [session, token] = [await begin('reader-2'), await make('reader-2')];
		const principals = [
			await s.principal.principalOf({ authorization: null, sessionCookie: session.secret }),
			await s.principal.principalOf({ authorization: `Bearer ${token.secret}`, sessionCookie: undefined })
		];
		expect(principals.map(({ kind }) => kind)).toEqual(['session', 'token']);
		for (const principal of principals) expect(await s.stillIn.isStillIn(principal)).toBe(true);
		expect(await s.stillIn.isActive(actors['reader-2'].id)).toBe(true);
		// Removed behind the service's back: nothing was ended or revoked, and still nobody gets in.
		await database.sql.begin(async (sql) => {
			await sql`update person set state = 'removed' where demo = 'reader-2'`;
			await sql`insert into audit_entry (actor, action, object_type, object_id, details)
				values ('installation', 'person.remove', 'person', ${actors['reader-2'].id}, '{}')`;
		});
		expect(await s.sessions.find(session.secret)).toBeNull();
		expect(await s.tokens.find(token.secret)).toBeNull();
		for (const principal of principals) expect(await s.stillIn.isStillIn(principal)).toBe(false);
		expect(await s.stillIn.isActive(actors['reader-2'].id)).toBe(false);
	});

	it('are not mixed: with an Authorization header no cookie counts', async () => {
		const { secret } = await begin('curator');
		for (const authorization of ['Bearer hb_nothing-that-exists-000000', 'Basic abc', '', 'Bearer']) {
			const principal = await s.principal.principalOf({ authorization, sessionCookie: secret });
			expect(principal.kind, authorization).toBe('unknown');
		}
	});

	it('have an intent to link that is good for one session and ten minutes', async () => {
		const { setClock } = await import('../../src/lib/server/clock.ts');
		const intent = s.intent.writeIntent('session-one');
		expect(s.intent.isIntent(intent, 'session-one')).toBe(true);
		expect(s.intent.isIntent(intent, 'session-two')).toBe(false);
		expect(
			s.intent.isIntent(`${Number(intent.split('.')[0]) + 1}.${intent.split('.')[1]}`, 'session-one')
		).toBe(false);
		expect(s.intent.isIntent(undefined, 'session-one')).toBe(false);
		setClock(() => new Date(Date.now() + 11 * 60_000));
		expect(s.intent.isIntent(intent, 'session-one')).toBe(false);
		setClock();
	});
});
