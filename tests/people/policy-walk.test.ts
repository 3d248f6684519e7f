import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POLICY, type Call } from '../../src/lib/server/policy.ts';
import { MEANINGS, type Who } from '../../src/lib/server/auth/access.ts';
import { SCOPES, type Scope } from '../../src/lib/schemas/token.ts';
import type { Role } from '../../src/lib/schemas/person.ts';
import { startPeopleServer } from '../support/people-server.ts';
import { signedInAs, visitor, type Visitor } from '../support/visitor.ts';

/** Every route, by every call that it answers and every one that it does not, as everybody: what the table says happens. */

type Answer = 'yes' | 'sign-in' | 'forbidden' | 'not answered';

interface Principal {
	name: string;
	person: Visitor;
	token?: string;
	role: Role | null;
	scopes?: readonly Scope[];
}

let server: Awaited<ReturnType<typeof startPeopleServer>>;
const principals: Principal[] = [];

async function tokenOf(account: string, scopes: readonly Scope[]): Promise<string> {
	const owner = await signedInAs(server.origin, account);
	const answer = await owner.request('/api/v1/tokens', {
		method: 'POST',
		body: JSON.stringify({ name: `walk ${scopes.join(' ')}`, scopes, days: 1 }),
		headers: { 'content-type': 'application/json' }
	});
	expect(answer.status).toBe(201);
	return ((await answer.json()) as { secret: string }).secret;
}

beforeAll(async () => {
	server = await startPeopleServer();
	const stranger = () => visitor(server.origin);
	principals.push({ name: 'signed out', person: stranger(), role: null });
	for (const [account, role] of [
		['reader', 'reader'],
		['researcher', 'researcher'],
		['curator', 'curator'],
		['administrator', 'administrator'],
		['lead', 'researcher'],
		['researcher-2', 'researcher']
	] as const) {
		principals.push({ name: account, person: await signedInAs(server.origin, account), role });
	}
	const removed = await signedInAs(server.origin, 'reader-2');
	const removedToken = await tokenOf('reader-2', SCOPES);
	await server.sql.begin(async (sql) => {
		const [{ id }] = await sql`update person set state = 'removed' where demo = 'reader-2' returning id`;
		await sql`insert into audit_entry (actor, action, object_type, object_id, details)
			values ('installation', 'person.remove', 'person', ${id}, '{}')`;
	});
	principals.push({ name: 'removed', person: removed, role: null });
	principals.push({ name: 'token of the removed', person: stranger(), token: removedToken, role: null });
	principals.push({ name: 'invented token', person: stranger(), token: `hb_${'A'.repeat(43)}`, role: null });
	for (const [account, role] of [
		['curator-2', 'curator'],
		['administrator-2', 'administrator']
	] as const) {
		for (const scope of SCOPES) {
			const token = await tokenOf(account, [scope]);
			const name = `${account} by token to ${scope}`;
			principals.push({ name, person: stranger(), token, role, scopes: [scope] });
		}
	}
}, 180_000);
afterAll(() => server.stop());

/** The table read a second time, in other words than the application's. */
function expected(who: Who, { role, token, scopes }: Principal, open: boolean): Answer {
	const { signedOut, roles, scope } = MEANINGS[who];
	if (signedOut === 'always') return 'yes';
	if (!role) return !token && signedOut === 'public' && open ? 'yes' : 'sign-in';
	if (!(roles as readonly Role[]).includes(role)) return 'forbidden';
	if (!token) return 'yes';
	return scope && scopes?.includes(scope) ? 'yes' : 'forbidden';
}

const PARAMETERS: Record<string, string> = {
	slug: 'no-such-thing',
	number: '1.0',
	id: '00000000-0000-4000-8000-000000000000',
	file: 'table.csv'
};

const addressOf = (route: string) => route.replace(/\[([^\]]+)\]/g, (_all, name: string) => PARAMETERS[name]);

async function call(route: string, how: string, { person, token }: Principal): Promise<Answer> {
	const isAction = how.startsWith('?/');
	const method = isAction ? 'POST' : how;
	const headers: Record<string, string> = token ? { authorization: `Bearer ${token}` } : {};
	let body: BodyInit | undefined;
	if (method !== 'GET') {
		if (route.startsWith('/api/')) {
			headers['content-type'] = 'application/json';
			body = '{}';
		} else body = new URLSearchParams({ publicReading: 'on', nothing: 'of use' });
	}
	const answer = await person.request(`${addressOf(route)}${isAction ? how : ''}`, { method, headers, body });
	await answer.body?.cancel();
	if (answer.status >= 500) throw new Error(`${how} ${route} answered ${answer.status}`);
	if (answer.status === 405) return 'not answered';
	if (answer.status === 403) return 'forbidden';
	const to = answer.headers.get('location') ?? '';
	if (answer.status === 401 || (answer.status === 303 && to.startsWith('/sign-in?to='))) return 'sign-in';
	return 'yes';
}

/** Signing out and ending sessions come last, because a principal that did so is another one afterwards. */
const ENDING = new Set(['/sign-out POST', '/account/sessions ?/others']);

function rows(): { route: string; how: Call; who: Who }[] {
	return Object.entries(POLICY)
		.flatMap(([route, row]) =>
			(Object.entries(row) as [Call, Who][]).map(([how, who]) => ({ route, how, who }))
		)
		.sort((a, b) => Number(ENDING.has(`${a.route} ${a.how}`)) - Number(ENDING.has(`${b.route} ${b.how}`)));
}

async function walk(open: boolean, some: readonly Principal[]) {
	const mismatches: string[] = [];
	let cells = 0;
	for (const { route, how, who } of rows()) {
		for (const principal of some) {
			if (ENDING.has(`${route} ${how}`) && principal.role) continue;
			const answer = await call(route, how, principal);
			const right = expected(who, principal, open);
			cells += 1;
			if (answer !== right) mismatches.push(`${how} ${route} as ${principal.name}: ${answer}, not ${right}`);
		}
	}
	return { mismatches, cells };
}

describe('the walk over the policy table', () => {
	it('finds no answer but the table’s, while the installation reads in public', async () => {
		const { mismatches, cells } = await walk(true, principals);
		expect(mismatches).toEqual([]);
		expect(cells).toBeGreaterThan(700);
	}, 120_000);

	it('answers nobody by a method or action that is not in the table', async () => {
		const idle: string[] = [];
		for (const [route, row] of Object.entries(POLICY)) {
			for (const how of ['GET', 'POST', 'PUT', 'PATCH', 'DELETE', '?/not-there', '?/constructor']) {
				if (Object.hasOwn(row, how)) continue;
				for (const principal of principals.filter(({ name }) => /^(signed out|administrator)$/.test(name))) {
					const answer = await call(route, how, principal);
					if (answer !== 'not answered') idle.push(`${how} ${route} as ${principal.name}: ${answer}`);
				}
			}
		}
		expect(idle).toEqual([]);
	}, 120_000);

	it('refuses every change that comes from another site, or from nowhere with cookies', async () => {
		const administrator = principals.find(({ name }) => name === 'administrator');
		const passed: string[] = [];
		for (const { route, how } of rows().filter(({ how: one }) => one !== 'GET')) {
			const method = how.startsWith('?/') ? 'POST' : how;
			for (const origin of ['https://evil.example', 'null']) {
				for (const type of ['application/x-www-form-urlencoded', 'text/plain', 'Application/JSON']) {
					const answer = await administrator?.person.request(
						`${addressOf(route)}${how.startsWith('?/') ? how : ''}`,
						{
							method,
							headers: { origin, 'content-type': type },
							body: method === 'DELETE' ? undefined : 'a=b'
						}
					);
					if (answer?.status !== 403)
						passed.push(`${how} ${route} from ${origin} as ${type}: ${answer?.status}`);
				}
			}
			const silent = await fetch(`${server.origin}${addressOf(route)}${how.startsWith('?/') ? how : ''}`, {
				method,
				headers: {
					cookie: `hairsbreadth-session=${administrator?.person.cookies.get('hairsbreadth-session')}`
				}
			});
			if (silent.status !== 403) passed.push(`${how} ${route} without an origin: ${silent.status}`);
		}
		expect(passed).toEqual([]);
	}, 120_000);

	it('changes nothing by reading', async () => {
		const print = async () => {
			const [{ all }] = await server.sql<{ all: string }[]>`
				select md5((select coalesce(string_agg(one::text, '' order by id), '') from person as one)
					|| (select coalesce(string_agg(one::text, '' order by id), '') from audit_entry as one)
					|| (select coalesce(string_agg(one::text, '' order by id), '') from invitation as one)
					|| (select coalesce(string_agg(one::text, '' order by id), '') from outbox as one)
					|| (select coalesce(string_agg(one::text, '' order by group_id, person_id), '') from membership as one)
					|| (select coalesce(string_agg(one::text, '' order by key), '') from setting as one)) as all`;
			return all;
		};
		const before = await print();
		const administrator = principals.find(({ name }) => name === 'administrator');
		for (const route of Object.keys(POLICY)) await administrator?.person.get(addressOf(route));
		expect(await print()).toBe(before);
	}, 60_000);

	it('closes to strangers what the setting closes', async () => {
		const administrator = await signedInAs(server.origin, 'administrator');
		expect((await administrator.form('/administration/settings', {})).status).toBe(200);
		await new Promise((resolve) => setTimeout(resolve, 2500));
		const strangers = principals.filter(({ role }) => role === null);
		const { mismatches } = await walk(false, strangers);
		expect(mismatches).toEqual([]);
		await administrator.form('/administration/settings', { publicReading: 'on' });
	}, 60_000);
});
