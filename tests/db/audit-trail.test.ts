import { describe, expect, it } from 'vitest';
import { auditChainBreak } from '../../src/lib/server/audit/append.ts';
import { useDatabase } from '../support/database.ts';

const db = useDatabase();

const append = (sql: typeof db.sql, action: string) =>
	sql`insert into audit_entry (actor, action, object_type, object_id, details)
		values ('a', ${action}, 'thing', 'x', '{}') returning id, hash, previous_hash`;

describe('the audit trail', () => {
	it.each(['update audit_entry set actor = actor', 'delete from audit_entry', 'truncate audit_entry'])(
		'refuses "%s" from the owner and from the application',
		async (statement) => {
			await expect(db.sql.unsafe(statement)).rejects.toMatchObject({
				constraint_name: 'audit_entry_append_only'
			});
			// The application lacks the privilege itself, so that not even a dropped trigger would open the way.
			await expect(db.applicationSql.unsafe(statement)).rejects.toMatchObject({ code: '42501' });
		}
	);

	it('does not let the application touch tables, triggers or functions', async () => {
		for (const statement of [
			'alter table audit_entry disable trigger all',
			'drop trigger version_guard on version',
			'alter table version add column x int',
			'create or replace function audit_entry_refuse() returns trigger language plpgsql as $$ begin return old; end $$',
			"set session_replication_role = 'replica'"
		])
			await expect(db.applicationSql.unsafe(statement), statement).rejects.toMatchObject({ code: '42501' });
	});

	it('numbers and seals the entries itself, whatever the writer gives', async () => {
		const [entry] = await db.applicationSql`
			insert into audit_entry (id, at, actor, action, object_type, object_id, details, transaction_id, previous_hash, hash)
			values (5, '2000-01-01', 'a', 'forged', 'thing', 'x', '{}', 1, 'mine', 'mine')
			returning id, at, transaction_id, hash, previous_hash`;
		expect(Number(entry.id)).toBeGreaterThan(5);
		expect(new Date(entry.at).getFullYear()).toBeGreaterThan(2000);
		expect(entry.hash).toMatch(/^[0-9a-f]{64}$/);
		expect(entry.previous_hash).toMatch(/^[0-9a-f]{64}$/);
	});

	it('stays one chain without forks or gaps when many write at once', async () => {
		const [{ before }] = await db.sql`select max(id)::int as before from audit_entry`;
		await Promise.all(
			Array.from({ length: 40 }, (_, index) =>
				append(index % 2 ? db.sql : db.applicationSql, `many-${index}`)
			)
		);
		const [{ after, count }] =
			await db.sql`select max(id)::int as after, count(*)::int as count from audit_entry`;
		expect(after - before).toBe(40);
		expect(count).toBe(after);
		expect(await auditChainBreak(db.database)).toBeNull();
	});

	it('leaves no trace of a transaction that was rolled back', async () => {
		const [{ before }] = await db.sql`select count(*)::int as before from audit_entry`;
		const rolledBack = db.sql.begin(async (tx) => {
			await append(tx as unknown as typeof db.sql, 'never');
			throw new Error('no');
		});
		await expect(rolledBack).rejects.toThrow('no');
		const [{ after }] = await db.sql`select count(*)::int as after from audit_entry`;
		expect(after).toBe(before);
		expect(await auditChainBreak(db.database)).toBeNull();
	});

	it.each([
		['a changed field', `update audit_entry set actor = 'someone else' where id = 7`, 7],
		['a changed detail', `update audit_entry set details = '{"x": 1}' where id = 9`, 9],
		['a removed entry', `delete from audit_entry where id = 11`, 12],
		[
			'a resealed entry',
			`update audit_entry as e set actor = 'x', hash = audit_entry_hash(row(e.id, e.at, 'x', e.action, e.object_type, e.object_id, e.from_state, e.to_state, e.details, e.transaction_id, e.previous_hash, '')::audit_entry) where id = 13`,
			14
		]
	])('shows where somebody with power over the server left %s', async (_what, statement, broken) => {
		const outcome = db.sql.begin(async (tx) => {
			await tx`set local session_replication_role = 'replica'`;
			await tx.unsafe(statement);
			const [{ found }] = await tx`select audit_chain_break()::int as found`;
			throw new Error(`found ${found}`);
		});
		await expect(outcome).rejects.toThrow(`found ${broken}`);
	});
});
