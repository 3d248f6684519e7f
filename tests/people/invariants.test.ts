import { beforeAll, describe, expect, it } from 'vitest';
import type postgres from 'postgres';
import { useDatabase } from '../support/database.ts';

/** What the database refuses to whoever speaks to it, the application's own role included. */

const database = useDatabase();
let id: string;

const audit = (sql: postgres.TransactionSql | postgres.Sql, type: string, object: string) => sql`
	insert into audit_entry (actor, action, object_type, object_id, details)
	values ('installation', 'test.step', ${type}, ${object}, '{}')`;

beforeAll(async () => {
	id = await database.applicationSql.begin(async (sql) => {
		const [row] = await sql`insert into person (email, name, role)
			values ('someone@larkmoor.example', 'Someone', 'administrator') returning id`;
		await audit(sql, 'person', row.id);
		return row.id as string;
	});
});

describe('without its row of the audit trail in the same transaction', () => {
	it.each([
		[
			'a person does not come',
			`insert into person (email, name, role) values ('x@larkmoor.example', 'X', 'reader')`
		],
		['a role is not given by somebody else', `update person set role_from = 'institution'`],
		['a group does not come', `insert into "group" (slug, name) values ('x', 'Group X')`],
		[
			'a session does not begin',
			`insert into session (secret_hash, person_id, begun_by, browser, created_at, last_seen_at, expires_at)
				select 'a', id, 'link', 'a', now(), now(), now() from person`
		],
		[
			'a token is not made',
			`insert into api_token (secret_hash, person_id, name, beginning, scopes, created_at, expires_at)
				select 'a', id, 'a', 'a', array['read'], now(), now() from person`
		],
		[
			'an invitation is not sent',
			`insert into invitation (secret_hash, email, role, invited_by, created_at, expires_at)
				select 'a', 'y@larkmoor.example', 'reader', id, now(), now() from person`
		],
		[
			'nothing is decided for everybody',
			`insert into setting (key, value, updated_by) values ('installation', '{"publicReading": false}', 'x')`
		]
	])('%s', async (_what, statement) => {
		await expect(database.applicationSql.unsafe(statement)).rejects.toMatchObject({
			constraint_name: expect.stringMatching(/_change_audited$/)
		});
	});

	it('a row of another transaction does not count', async () => {
		await audit(database.applicationSql, 'person', id);
		await expect(database.applicationSql`update person set name = 'Other'`).rejects.toMatchObject({
			constraint_name: 'person_change_audited'
		});
	});
});

describe('for good', () => {
	it.each([
		[
			'an account is not deleted as a row',
			'delete from person',
			/permission denied|named by others|never deleted/
		],
		['the trail is not rewritten', `update audit_entry set actor = 'x'`, /permission denied|append-only/],
		['the trail is not shortened', 'delete from audit_entry', /permission denied|append-only/]
	])('%s, by the role of the application', async (_what, statement, reason) => {
		await expect(database.applicationSql.unsafe(statement)).rejects.toThrow(reason);
	});

	it('an account is not deleted by the owner of the tables either', async () => {
		await expect(database.sql`delete from person`).rejects.toMatchObject({ constraint_name: 'person_kept' });
	});

	it('the last administrator stays one', async () => {
		await expect(
			database.applicationSql.begin(async (sql) => {
				await sql`update person set role = 'reader' where id = ${id}`;
				await audit(sql, 'person', id);
			})
		).rejects.toMatchObject({ constraint_name: 'person_administrator_left' });
	});

	it('one of two administrators stays who give up at the same moment', async () => {
		const second = await database.applicationSql.begin(async (sql) => {
			const [row] = await sql`insert into person (email, name, role)
				values ('second@larkmoor.example', 'Second', 'administrator') returning id`;
			await audit(sql, 'person', row.id);
			return row.id as string;
		});
		const giveUp = (who: string) =>
			database.applicationSql.begin(async (sql) => {
				await sql`update person set role = 'reader' where id = ${who}`;
				await audit(sql, 'person', who);
			});
		const ends = await Promise.allSettled([giveUp(id), giveUp(second)]);
		expect(ends.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
		const left = await database.sql`select from person where role = 'administrator' and state = 'active'`;
		expect(left).toHaveLength(1);
	});

	it('a token only loses', async () => {
		const token = await database.applicationSql.begin(async (sql) => {
			const [row] = await sql`insert into api_token
				(secret_hash, person_id, name, beginning, scopes, created_at, expires_at)
				values ('b', ${id}, 'a', 'a', array['read', 'upload'], now(), now() + interval '1 day') returning id`;
			await audit(sql, 'token', row.id);
			return row.id as string;
		});
		const change = (set: string) =>
			database.applicationSql.begin(async (sql) => {
				await sql.unsafe(`update api_token set ${set} where id = '${token}'`);
				await audit(sql, 'token', token);
			});
		const refused = { constraint_name: 'api_token_only_loses' };
		await expect(change(`scopes = array['read', 'review']`)).rejects.toMatchObject(refused);
		await expect(change(`expires_at = expires_at + interval '1 day'`)).rejects.toMatchObject(refused);
		await expect(change(`secret_hash = 'c'`)).rejects.toMatchObject(refused);
		await change(`revoked_at = now(), scopes = array['read']`);
		await expect(change('revoked_at = null')).rejects.toMatchObject(refused);
	});

	it.each([
		[
			'session',
			`(secret_hash, person_id, begun_by, browser, created_at, last_seen_at, expires_at)
			select 'z', id, 'link', 'a', now(), now(), now() + interval '31 days' from person limit 1`,
			'session_absolute_limit'
		],
		[
			'sign_in_link',
			`(secret_hash, email, browser_hash, created_at, expires_at)
			values ('z', 'a@b.example', 'z', now(), now() + interval '11 minutes')`,
			'sign_in_link_limit'
		],
		[
			'api_token',
			`(secret_hash, person_id, name, beginning, scopes, created_at, expires_at)
			select 'z', id, 'a', 'a', array['read'], now(), now() + interval '2 years' from person limit 1`,
			'api_token_year_at_most'
		],
		[
			'api_token',
			`(secret_hash, person_id, name, beginning, scopes, created_at, expires_at)
			select 'z', id, 'a', 'a', array['everything'], now(), now() from person limit 1`,
			'api_token_scopes_known'
		],
		[
			'outbox',
			`(kind, recipient, data, sealed, state, next_attempt_at, created_at, sent_at)
			values ('a', 'a', '{}', 'still here', 'sent', now(), now(), now())`,
			'outbox_secret_forgotten'
		]
	])('a row of %s stays within its limits', async (table, rest, constraint) => {
		await expect(database.sql.unsafe(`insert into ${table} ${rest}`)).rejects.toMatchObject({
			constraint_name: constraint
		});
	});
});
