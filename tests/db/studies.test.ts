import { beforeAll, describe, expect, it } from 'vitest';
import { Conflict, Forbidden, InvalidInput, NotFound, StateError } from '../../src/lib/server/errors.ts';
import { deleteAccount, exportData } from '../../src/lib/server/people/account.ts';
import { list as told } from '../../src/lib/server/notifications/list.ts';
import { impactOf } from '../../src/lib/server/studies/impact.ts';
import * as comments from '../../src/lib/server/studies/comments.ts';
import * as studies from '../../src/lib/server/studies/studies.ts';
import { approve, submit, withdraw } from '../../src/lib/server/library/curation.ts';
import { candidate } from '../../src/lib/server/library/reviewing.ts';
import * as uploads from '../../src/lib/server/library/uploads.ts';
import { studyQuery } from '../../src/lib/schemas/saved-study.ts';
import type { SignedIn } from '../../src/lib/schemas/person.ts';
import { useDatabase } from '../support/database.ts';
import { demoPeople } from '../support/curators.ts';

/** Studies that are kept: who sees them, that nothing is overwritten or forgotten, and who is told of what they rest on. */

const database = useDatabase();
let people: Record<string, SignedIn>;

beforeAll(async () => {
	people = await demoPeople();
});

const QUERY =
	'?left=gold-johnson-christy@1.0&medium=vacuum@1.0&right=silica-two-oscillators@1.0&choice=One&at=50';
const fields = (over: Partial<Parameters<typeof studies.create>[1]> = {}) => ({
	name: 'A gap of gold',
	query: QUERY,
	notes: '',
	reasons: [],
	visibility: 'private' as const,
	group: null,
	...over
});
const names = async (actor: SignedIn, show: 'mine' | 'group' | 'shared' | 'archived', search = '') =>
	(await studies.list(actor, { ...studyQuery.parse({}), show, search })).studies.map(({ name }) => name);

describe('who sees a study', () => {
	it('is its owner alone while it is private, and a lead of its group', async () => {
		const { researcher, curator, lead, 'researcher-2': stranger, administrator } = people;
		const { id } = await studies.create(researcher, fields({ group: 'cantilevers' }));
		expect((await studies.get(researcher, id)).mayEdit).toBe(true);
		// The lead of the group sees what is done in it, and does not write in what is not shared.
		expect((await studies.get(lead, id)).mayEdit).toBe(false);
		for (const other of [curator, stranger, administrator]) {
			await expect(studies.get(other, id)).rejects.toBeInstanceOf(NotFound);
			await expect(studies.change(other, id, { revision: 1, name: 'x' })).rejects.toBeInstanceOf(NotFound);
			await expect(studies.history(other, id)).rejects.toBeInstanceOf(NotFound);
			await expect(studies.duplicate(other, id)).rejects.toBeInstanceOf(NotFound);
		}
	});

	it('is the group that it is shared with, to work on; readers of it look', async () => {
		const { researcher, curator, 'researcher-2': stranger, reader } = people;
		const canary = `canary-${Date.now().toString(36)}`;
		const { id } = await studies.create(
			researcher,
			fields({ name: canary, notes: canary, visibility: 'group', group: 'cantilevers' })
		);
		expect((await studies.get(curator, id)).mayEdit).toBe(true);
		expect(await names(curator, 'group', canary)).toEqual([canary]);
		for (const other of [stranger, reader]) {
			for (const show of ['mine', 'group', 'shared', 'archived'] as const) {
				expect(await names(other, show, canary)).toEqual([]);
			}
		}
	});

	it('is everybody signed in where it is open, to read and to duplicate', async () => {
		const { researcher, reader } = people;
		const { id } = await studies.create(researcher, fields({ name: 'Open to all', visibility: 'signed-in' }));
		expect(await studies.get(reader, id)).toMatchObject({ mayEdit: false, own: false });
		await expect(studies.change(reader, id, { revision: 1, name: 'Mine' })).rejects.toBeInstanceOf(Forbidden);
		const copy = await studies.duplicate(reader, id);
		expect(copy).toMatchObject({ name: 'Open to all (copy)', visibility: 'private', query: QUERY });
		expect((await studies.get(reader, copy.id)).own).toBe(true);
	});

	it('takes no group that is not one’s own', async () => {
		const wet = fields({ visibility: 'group', group: 'wet-films' });
		await expect(studies.create(people.researcher, wet)).rejects.toBeInstanceOf(InvalidInput);
		await expect(studies.create(people.researcher, fields({ visibility: 'group' }))).rejects.toMatchObject({
			issues: [{ path: 'group' }]
		});
	});
});

describe('two people at one study', () => {
	it('never overwrite each other: the second is told who saved', async () => {
		const { researcher, curator } = people;
		const { id } = await studies.create(researcher, fields({ visibility: 'group', group: 'cantilevers' }));
		await studies.change(curator, id, { revision: 1, query: QUERY.replace('at=50', 'at=60') });
		await expect(studies.change(researcher, id, { revision: 1, query: QUERY })).rejects.toThrow(
			'Larkmoor curator saved this study'
		);
		const outcomes = await Promise.allSettled(
			Array.from({ length: 20 }, (_, index) =>
				studies.change(researcher, id, { revision: 2, name: `N${index}` })
			)
		);
		expect(outcomes.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
		for (const outcome of outcomes)
			if (outcome.status === 'rejected') expect(outcome.reason).toBeInstanceOf(Conflict);
		// Who sees it is the owner's to say.
		await expect(studies.change(curator, id, { revision: 3, visibility: 'private' })).rejects.toBeInstanceOf(
			Forbidden
		);
	});

	it('keeps every state, and brings any of them back', async () => {
		const { researcher } = people;
		const { id } = await studies.create(researcher, fields({ name: 'First' }));
		await studies.change(researcher, id, {
			revision: 1,
			name: 'Second',
			query: QUERY.replace('at=50', 'at=70')
		});
		await studies.change(researcher, id, { revision: 2, notes: 'Third' });
		expect((await studies.history(researcher, id)).map(({ revision, name }) => [revision, name])).toEqual([
			[3, 'Second'],
			[2, 'Second'],
			[1, 'First']
		]);
		const back = await studies.restore(researcher, id, { from: 1, revision: 3 });
		expect(back).toMatchObject({ name: 'First', query: QUERY, notes: '', revision: 4 });
		await expect(
			database.applicationSql`update study_change set name = 'Other' where study_id = ${id}`
		).rejects.toThrow(/permission denied|never change/);
		await expect(database.sql`delete from study_change where study_id = ${id}`).rejects.toMatchObject({
			constraint_name: 'study_change_append_only'
		});
		await expect(
			database.applicationSql`update study set name = 'Other' where id = ${id}`
		).rejects.toMatchObject({ constraint_name: 'study_change_audited' });
	});
});

describe('a long list', () => {
	it('is paged by an index, without a row lost or doubled', async () => {
		const { 'curator-2': owner } = people;
		await database.sql.begin(async (sql) => {
			await sql`alter table study disable trigger study_change_audited`;
			await sql`insert into study (owner_id, name, query, visibility, created_at, saved_at, saved_by)
				select ${owner.id}, 'Many ' || lpad(n::text, 5, '0'), '?', 'private', now(),
					now() - (n / 3) * interval '1 second', ${owner.id} from generate_series(1, 10000) as n`;
			await sql`alter table study enable trigger study_change_audited`;
			await sql`analyze study`;
		});
		for (const sort of ['saved', 'name'] as const) {
			const seen = new Set<string>();
			let cursor: string | undefined;
			for (let page = 0; page < 5; page += 1) {
				const found = await studies.list(owner, { search: 'Many', show: 'mine', sort, cursor });
				for (const { id } of found.studies) seen.add(id);
				cursor = found.next ?? undefined;
			}
			expect(seen.size).toBe(300);
		}
		const plan = await database.sql`explain select * from study where owner_id = ${owner.id}
			and archived_at is null order by saved_at desc, id limit 61`;
		expect(plan.map((row) => row['QUERY PLAN']).join('\n')).toContain('study_owner_index');
	}, 30_000);
});

describe('a version that a study rests on', () => {
	it('has its owner told when a newer one is published and when it is withdrawn, by mail if they want it', async () => {
		const { researcher, curator, 'curator-2': reviewer } = people;
		const { id, versions } = await studies.create(researcher, fields({ name: 'Told of' }));
		expect(versions).toContain('gold-johnson-christy@1.0');
		const upload = await uploads.start(curator, {
			raw: { name: 'a.csv', bytes: Buffer.from('nm;n;k\n800;0.18;5.1\n600;0.25;3\n400;1.6;1.9\n') }
		});
		await uploads.save(curator, upload, 0, {
			dataset: 'gold-johnson-christy',
			source: 'johnson-christy-1972'
		});
		const { slug, number } = await uploads.makeDraft(curator, upload);
		const { version } = await candidate(curator, slug, number);
		const answers = Object.fromEntries(
			version.checks.filter(({ severity }) => severity === 'warn').map(({ code }) => [code, 'Meant.'])
		);
		const { checksum } = version;
		await submit(curator, slug, number, { checksum, answers });
		await approve(reviewer, slug, number, { checksum });

		const first = (await told(researcher)).told[0];
		expect(first.subject).toBe(`${version.ref} is new, and your study rests on an earlier version`);
		expect(first.link.href).toBe(`/studies/${id}`);
		expect((await studies.get(researcher, id)).study.versions).toContain('gold-johnson-christy@1.0');
		const [mail] = await database.sql`select recipient, data from outbox
			where kind = 'study-input-published' and data ->> 'studyId' = ${id}`;
		expect(mail.recipient).toBe('researcher@larkmoor.example');

		const pinned = QUERY.replace('johnson-christy@1.0', `johnson-christy@${number}`);
		await studies.change(researcher, id, { revision: 1, query: pinned });
		await withdraw(reviewer, slug, number, { checksum, reason: 'A wrong film.' });
		expect((await told(researcher)).told[0].subject).toBe(
			`${version.ref} is withdrawn, and your study rests on it`
		);
	}, 30_000);
});

describe('the impact of a version under review', () => {
	it('is computed for every study that rests on its dataset, named only where the reviewer may see it', async () => {
		const { researcher, curator, 'curator-2': reviewer, 'researcher-2': stranger } = people;
		const slug = 'lead-drude';
		const query = (version: string) =>
			`?left=${slug}@${version}&medium=vacuum@1.0&right=silica-two-oscillators@1.0&choice=One&from=10&to=1000&at=50`;
		const open = await studies.create(researcher, fields({ query: query('1.0'), visibility: 'signed-in' }));
		await studies.create(stranger, fields({ name: 'Hidden name', query: query('1.0') }));
		const elsewhere = await studies.create(researcher, fields({ name: 'Not of lead' }));

		// A candidate whose permittivity is that of vacuum: the force goes, in every study.
		const id = await uploads.start(curator, {
			form: { dataset: slug, source: 'ordal-1985', model: '{"kind":"constant","value":1.000001}' }
		});
		const draft = await uploads.makeDraft(curator, id);
		const { version } = await candidate(curator, draft.slug, draft.number);
		const answers = Object.fromEntries(
			version.checks.filter(({ severity }) => severity === 'warn').map(({ code }) => [code, 'Meant.'])
		);
		await submit(curator, slug, draft.number, { checksum: version.checksum, answers });

		const lines = [];
		const { ref, model } = version;
		for await (const line of impactOf(reviewer, { ref, model }, new AbortController().signal))
			lines.push(line);
		expect(lines[0]).toEqual({ of: 2 });
		const impacts = lines.flatMap((line) => ('impact' in line ? [line.impact] : []));
		expect(impacts.map(({ study }) => study)).toEqual([{ id: open.id, name: open.name }, null]);
		expect(JSON.stringify(lines)).not.toContain('Hidden name');
		expect(JSON.stringify(lines)).not.toContain(elsewhere.id);
		for (const { changes } of impacts) {
			expect(changes).toHaveLength(1);
			expect(changes[0].largestPercent).toBeGreaterThan(99);
			expect(changes[0].points.some(({ separationNm }) => separationNm === 50)).toBe(true);
		}
	}, 60_000);
});

describe('comments', () => {
	const comment = (text: string) => ({ text, choice: null, separationNm: null });

	it('are for who sees the study; whoever is named and may see it is told, and nobody else', async () => {
		const { lead, researcher, curator, 'researcher-2': stranger } = people;
		const { id } = await studies.create(
			lead,
			fields({ name: 'Talked about', visibility: 'group', group: 'cantilevers' })
		);
		await expect(comments.add(stranger, id, comment('Hello'))).rejects.toBeInstanceOf(NotFound);
		await expect(comments.list(stranger, id)).rejects.toBeInstanceOf(NotFound);
		const before = (await told(stranger)).told.length;
		await comments.add(researcher, id, {
			text: 'See B, @Larkmoor curator and @Larkmoor researcher 2.',
			choice: 1,
			separationNm: 38
		});
		expect((await told(curator)).told[0].subject).toBe(
			'Larkmoor researcher names you in a comment on "Talked about"'
		);
		expect((await told(lead)).told[0].subject).toBe(
			'Larkmoor researcher commented on your study "Talked about"'
		);
		// A name in the text opens nothing to somebody who may not see the study.
		expect((await told(stranger)).told).toHaveLength(before);
		const [first] = await comments.list(lead, id);
		expect(first).toMatchObject({ by: 'Larkmoor researcher', choice: 1, separationNm: 38, resolved: null });
		await comments.resolve(lead, id, first.id);
		await expect(comments.resolve(researcher, id, first.id)).rejects.toBeInstanceOf(StateError);
		expect(await comments.countOpen(id)).toBe(0);
		await expect(
			database.applicationSql`update study_comment set text = 'Other' where id = ${first.id}`
		).rejects.toMatchObject({ constraint_name: 'study_comment_permanent' });
	});

	it('take a longer name for what it is', async () => {
		const { lead, curator } = people;
		const { id } = await studies.create(lead, fields({ name: 'Names', visibility: 'signed-in' }));
		const before = (await told(curator)).told.length;
		await comments.add(lead, id, comment('@Larkmoor curator 2, please look.'));
		expect((await told(curator)).told).toHaveLength(before);
		expect((await told(people['curator-2'])).told[0].subject).toContain('names you');
	});
});

describe('deleting an account', () => {
	it('takes the private studies with every state of them, and leaves what is shared', async () => {
		const { 'reader-2': person, reader } = people;
		const own = await studies.create(person, fields({ name: 'Only mine' }));
		await studies.change(person, own.id, { revision: 1, notes: 'Changed' });
		await comments.add(person, own.id, { text: 'To myself', choice: null, separationNm: null });
		const shared = await studies.create(person, fields({ name: 'For all', visibility: 'signed-in' }));
		await expect(database.applicationSql`delete from study where id = ${own.id}`).rejects.toThrow();
		await expect(
			database.applicationSql`delete from study_change where study_id = ${own.id}`
		).rejects.toMatchObject({ constraint_name: 'study_change_append_only' });
		expect(((await exportData(person)).studies as { name: string }[]).map(({ name }) => name)).toEqual([
			'Only mine',
			'For all'
		]);
		await deleteAccount(person);
		const [{ left }] = await database.sql`select (select count(*) from study where id = ${own.id})
			+ (select count(*) from study_change where study_id = ${own.id}) as left`;
		expect(Number(left)).toBe(0);
		expect((await studies.get(reader, shared.id)).study.owner).toBe('Larkmoor reader 2');
	});
});
