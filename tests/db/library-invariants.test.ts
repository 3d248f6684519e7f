import { beforeEach, describe, expect, it } from 'vitest';
import { useDatabase } from '../support/database.ts';
import { aDraft, move } from '../support/library.ts';

const db = useDatabase();

/** What PostgreSQL says of a refused statement: code and constraint, "accepted" if it was none. */
async function refusal(work: Promise<unknown>): Promise<string> {
	try {
		await work;
		return 'accepted';
	} catch (error) {
		const { code, constraint_name: constraint } = error as { code?: string; constraint_name?: string };
		return `${code} ${constraint ?? ''}`.trim();
	}
}

const IMMUTABLE = '23001 version_immutable';

describe('a version that has left draft', () => {
	let id: string;
	beforeEach(async () => {
		id = await aDraft(db.sql);
		await move(db.sql, id, 'in_review');
	});

	it.each([
		['model', `model = '{"kind":"vacuum"}'`],
		['checksum', `checksum = 'sha256:' || repeat('0', 64)`],
		['note', `note = 'another'`],
		['quality', `quality = 'checked', quality_reason = null`],
		['measured range', `measured_low_ev = 1, measured_high_ev = 2`],
		['rows', `epsilon1 = array[1.0, 2.0]`],
		['raw bytes', `raw = 'x', raw_name = 'x', raw_sha256 = 'x'`],
		['number', `major = 77`],
		['dataset', `dataset_id = (select id from dataset where slug = 'gold-plasma')`],
		['parent', `parent_id = id`],
		['creation', `created_at = now()`],
		['author', `created_by = 'another'`],
		['submitter', `submitted_by = 'another'`],
		['identity', `id = gen_random_uuid()`]
	])(
		'keeps its %s against raw SQL, in review and published, for owner and application',
		async (_what, change) => {
			const attempt = (sql: typeof db.sql) =>
				refusal(sql.unsafe(`update version set ${change} where id = '${id}'`));
			expect(await attempt(db.sql)).toBe(IMMUTABLE);
			await move(db.sql, id, 'published');
			expect(await attempt(db.sql)).toBe(IMMUTABLE);
			expect(await attempt(db.applicationSql)).toBe(IMMUTABLE);
		}
	);

	it('cannot be changed in the same statement that takes a step', async () => {
		const change = db.sql`update version set state = 'published', published_at = now(), published_by = 'b',
			note = 'another' where id = ${id}`;
		expect(await refusal(change)).toBe(IMMUTABLE);
	});

	it('keeps its sources and checks', async () => {
		await move(db.sql, id, 'published');
		const statements = [
			`delete from version_source where version_id = '${id}'`,
			`update version_source set position = 9 where version_id = '${id}'`,
			`insert into version_source select '${id}', id, 7 from source where slug = 'peter-1923'`,
			`delete from check_result where version_id = '${id}'`,
			`update check_result set message = 'another' where version_id = '${id}'`,
			`insert into check_result values ('${id}', 'new', 9, 'info', 'x', null, null, null)`
		];
		for (const statement of statements)
			expect(await refusal(db.sql.unsafe(statement)), statement).toBe(IMMUTABLE);
	});

	it('cannot take in a source or check of a draft', async () => {
		const draft = await aDraft(db.sql);
		const change = db.sql`update check_result set version_id = ${id}, code = 'moved' where version_id = ${draft}`;
		expect(await refusal(change)).toBe(IMMUTABLE);
	});

	it('is never deleted, nor is what it stands on', async () => {
		await move(db.sql, id, 'published');
		expect(await refusal(db.sql`delete from version where id = ${id}`)).toBe('23001 version_kept');
		expect(await refusal(db.sql`truncate version cascade`)).toMatch(/^23001/);
		expect(await refusal(db.sql`delete from dataset where slug = 'gold-drude'`)).toMatch(/^23503/);
		expect(await refusal(db.sql`delete from material where slug = 'gold'`)).toMatch(/^23503/);
		expect(await refusal(db.sql`delete from source where slug = 'ordal-1985'`)).toMatch(/^23503/);
	});
});

describe('the life of a version', () => {
	it.each([
		['draft', 'published'],
		['draft', 'withdrawn'],
		['in_review', 'withdrawn'],
		['published', 'draft'],
		['published', 'in_review'],
		['withdrawn', 'published'],
		['withdrawn', 'draft']
	] as const)('has no step from %s to %s', async (from, to) => {
		const id = await aDraft(db.sql);
		const path = {
			draft: [],
			in_review: ['in_review'],
			published: ['in_review', 'published'],
			withdrawn: ['in_review', 'published', 'withdrawn']
		} as const;
		for (const state of path[from]) await move(db.sql, id, state);
		expect(await refusal(move(db.sql, id, to))).toBe('23514 version_state_graph');
	});

	it('goes back from review to draft, where it may change again', async () => {
		const id = await aDraft(db.sql);
		await move(db.sql, id, 'in_review');
		await move(db.sql, id, 'draft');
		expect(await refusal(db.sql`update version set note = 'better' where id = ${id}`)).toBe('accepted');
	});

	it('begins as a draft', async () => {
		const change = db.sql`insert into version (dataset_id, major, minor, state, quality, kind, model, checksum,
			fingerprint, conducts, created_by, published_at, published_by)
			select id, 500, 0, 'published', 'checked', 'model', '{"kind":"vacuum"}'::jsonb, 'sha256:' || repeat('0', 64),
			'sha256:' || repeat('0', 64), true, 'a', now(), 'b' from dataset where slug = 'gold-drude'`;
		expect(await refusal(change)).toBe('23514 version_begins_as_draft');
	});

	it('takes no step without an audit row in the same transaction', async () => {
		const id = await aDraft(db.sql);
		const silent = db.sql`update version set state = 'in_review', submitted_at = now(), submitted_by = 'a' where id = ${id}`;
		expect(await refusal(silent)).toBe('23514 version_transition_audited');
		const [{ state }] = await db.sql`select state from version where id = ${id}`;
		expect(state).toBe('draft');
	});

	it('does not count an audit row of an earlier transaction, or of another step', async () => {
		const id = await aDraft(db.sql);
		await db.sql`insert into audit_entry (actor, action, object_type, object_id, from_state, to_state, details)
			values ('a', 'version.submit', 'version', ${id}, 'draft', 'in_review', '{}')`;
		const silent = db.sql`update version set state = 'in_review', submitted_at = now(), submitted_by = 'a' where id = ${id}`;
		expect(await refusal(silent)).toBe('23514 version_transition_audited');
		const other = db.sql.begin(async (tx) => {
			await tx`update version set state = 'in_review', submitted_at = now(), submitted_by = 'a' where id = ${id}`;
			await tx`insert into audit_entry (actor, action, object_type, object_id, from_state, to_state, details)
				values ('a', 'version.publish', 'version', ${id}, 'in_review', 'published', '{}')`;
		});
		expect(await refusal(other)).toBe('23514 version_transition_audited');
	});

	it('needs a source, its checks, no fail and an answer to each warning before review', async () => {
		const bare = await aDraft(db.sql, { sources: [] });
		expect(await refusal(move(db.sql, bare, 'in_review'))).toBe('23514 version_submission_sourced');
		const cases = [
			[],
			[{ severity: 'fail', answer: 'but' }],
			[{ severity: 'warn', answer: null }],
			[{ severity: 'warn', answer: '  ' }]
		];
		for (const checks of cases) {
			const id = await aDraft(db.sql, { checks });
			expect(await refusal(move(db.sql, id, 'in_review')), JSON.stringify(checks)).toBe(
				'23514 version_submission_checked'
			);
		}
		const answered = await aDraft(db.sql, { checks: [{ severity: 'warn', answer: 'known and meant' }] });
		expect(await refusal(move(db.sql, answered, 'in_review'))).toBe('accepted');
	});

	it('is not published by the person who submitted it', async () => {
		const id = await aDraft(db.sql);
		await move(db.sql, id, 'in_review', 'curator@larkmoor.example');
		expect(await refusal(move(db.sql, id, 'published', 'curator@larkmoor.example'))).toBe(
			'23514 version_published_by_another'
		);
		expect(await refusal(move(db.sql, id, 'published', 'second-curator@larkmoor.example'))).toBe('accepted');
	});

	it('is published once when thirty try at once', async () => {
		const id = await aDraft(db.sql);
		await move(db.sql, id, 'in_review');
		const outcomes = await Promise.all(
			Array.from({ length: 30 }, (_, index) => refusal(move(db.sql, id, 'published', `reviewer-${index}`)))
		);
		expect(outcomes.filter((outcome) => outcome === 'accepted')).toHaveLength(1);
	});
});

describe('numbers and addresses', () => {
	it('has each version number once in a dataset', async () => {
		await aDraft(db.sql, { major: 900 });
		expect(await refusal(aDraft(db.sql, { major: 900 }))).toBe('23505 version_number_key');
	});

	it.each(['NaN', 'Infinity', '-Infinity'])('refuses %s wherever a number is kept', async (number) => {
		const id = await aDraft(db.sql);
		const value = `'${number}'::float8`;
		const statements = [
			[
				`update version set given_abscissa = array[1, ${value}] where id = '${id}'`,
				'version_given_abscissa_finite'
			],
			[`update version set given_first = array[${value}] where id = '${id}'`, 'version_given_first_finite'],
			[`update version set given_second = array[${value}] where id = '${id}'`, 'version_given_second_finite'],
			[`update version set epsilon1 = array[${value}] where id = '${id}'`, 'version_epsilon1_finite'],
			[
				`update version set conducts = false, static_permittivity = ${value} where id = '${id}'`,
				'version_static_permittivity_of_insulators'
			],
			[`update version set temperature_k = ${value} where id = '${id}'`, 'version_temperature_range'],
			[
				`update version set measured_low_ev = 0, measured_high_ev = ${value} where id = '${id}'`,
				'version_measured_range'
			],
			[`update check_result set figure = ${value} where version_id = '${id}'`, 'check_result_figure_finite'],
			[`update material set density_g_per_cm3 = ${value} where slug = 'gold'`, 'material_density_positive'],
			[
				`update material set static_permittivity = ${value} where slug = 'silica'`,
				'material_static_permittivity_range'
			]
		];
		for (const [statement, constraint] of statements)
			expect(await refusal(db.sql.unsafe(statement)), statement).toBe(`23514 ${constraint}`);
	});

	it('keeps slugs, and a dataset with published versions stays with its material', async () => {
		for (const table of ['material', 'source', 'dataset'])
			expect(await refusal(db.sql.unsafe(`update ${table} set slug = slug || '-x'`))).toBe(
				'23001 slug_permanent'
			);
		const move = db.sql`update dataset set material_id = (select id from material where slug = 'silver') where slug = 'gold-drude'`;
		expect(await refusal(move)).toBe('23001 dataset_material_permanent');
	});
});
