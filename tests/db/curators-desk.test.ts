import { beforeAll, describe, expect, it } from 'vitest';
import { Conflict, InvalidInput, NotFound, StateError } from '../../src/lib/server/errors.ts';
import { approve, recommend, submit, withdraw } from '../../src/lib/server/library/curation.ts';
import { tableCsv } from '../../src/lib/server/library/downloads.ts';
import * as versions from '../../src/lib/server/library/versions.ts';
import * as materials from '../../src/lib/server/library/materials.ts';
import { candidate, queue, waitingFor } from '../../src/lib/server/library/reviewing.ts';
import { compare, comparisonQuery } from '../../src/lib/server/library/comparison.ts';
import * as uploads from '../../src/lib/server/library/uploads.ts';
import { list, markRead, unread } from '../../src/lib/server/notifications/list.ts';
import type { SignedIn } from '../../src/lib/schemas/person.ts';
import { useDatabase } from '../support/database.ts';
import { demoPeople } from '../support/curators.ts';

/** From a file on somebody's desk to a published version, through the services that the pages call. */

const database = useDatabase();
let maker: SignedIn;
let reviewer: SignedIn;

beforeAll(async () => {
	({ curator: maker, 'curator-2': reviewer } = await demoPeople());
});

const FILE =
	'Wellenlänge (nm);n;k\n1200;0,35;8,2\n800;0,18;5,11\n600;0,25;3,0\n400;1,66;1,96\n200;1,43;1,4\n';
const raw = (text = FILE) => ({ raw: { name: 'film.csv', bytes: Buffer.from(text) } });
const ABOUT = { dataset: 'gold-johnson-christy', source: 'johnson-christy-1972', note: 'A new film.' };

async function draft(form: Record<string, string> = ABOUT, text = FILE) {
	const id = await uploads.start(maker, raw(text));
	await uploads.save(maker, id, 0, form);
	return { id, ...(await uploads.makeDraft(maker, id)) };
}

async function submitted() {
	const made = await draft();
	const { version } = await candidate(maker, made.slug, made.number);
	const answers = Object.fromEntries(
		version.checks.filter(({ severity }) => severity === 'warn').map(({ code }) => [code, 'Known and meant.'])
	);
	await submit(maker, made.slug, made.number, { checksum: version.checksum, answers });
	return { ...made, checksum: version.checksum };
}

describe('an upload', () => {
	it('keeps what is typed, and is nobody else’s to see', async () => {
		const id = await uploads.start(maker, raw());
		await uploads.save(maker, id, 0, { note: 'half a thou' });
		expect((await uploads.get(maker, id)).form).toMatchObject({ note: 'half a thou', 'column.2': 'n' });
		await expect(uploads.get(reviewer, id)).rejects.toBeInstanceOf(NotFound);
		await expect(uploads.save(reviewer, id, 1, {})).rejects.toBeInstanceOf(NotFound);
		await expect(uploads.remove(reviewer, id)).rejects.toBeInstanceOf(NotFound);
	});

	it('tells the second window that the first one saved, and keeps what that typed', async () => {
		const id = await uploads.start(maker, raw());
		await uploads.save(maker, id, 0, { note: 'first' });
		await expect(uploads.save(maker, id, 0, { note: 'second' })).rejects.toBeInstanceOf(Conflict);
		expect((await uploads.get(maker, id)).form.note).toBe('first');
	});

	it('lets one of many savings at once through', async () => {
		const id = await uploads.start(maker, raw());
		const saved = await Promise.allSettled(
			Array.from({ length: 12 }, (_, index) => uploads.save(maker, id, 0, { note: String(index) }))
		);
		expect(saved.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
		expect((await uploads.get(maker, id)).revision).toBe(1);
	});

	it('leaves no row of a file that is no text', async () => {
		const before = (await uploads.list(maker)).length;
		await expect(
			uploads.start(maker, { raw: { name: 'x', bytes: Buffer.from('PK\u0003\u0004') } })
		).rejects.toThrow('not a text file');
		expect(await uploads.list(maker)).toHaveLength(before);
	});

	it('makes no draft while something is missing, and says what', async () => {
		const id = await uploads.start(maker, raw());
		await uploads.save(maker, id, 0, { source: 'johnson-christy-1972' });
		await expect(uploads.makeDraft(maker, id)).rejects.toMatchObject({ issues: [{ path: 'dataset' }] });
		await uploads.save(maker, id, 1, { ...ABOUT, source: '' });
		await expect(uploads.makeDraft(maker, id)).rejects.toMatchObject({
			issues: [{ path: expect.stringContaining('source') }]
		});
		expect((await uploads.get(maker, id)).ref).toBeNull();
	});

	it('makes its draft anew after a change, with the answers that were given', async () => {
		const made = await draft();
		const { version } = await candidate(maker, made.slug, made.number);
		await uploads.save(maker, made.id, 1, { ...ABOUT, note: 'Changed words.' });
		const again = await uploads.makeDraft(maker, made.id);
		expect(again.number).toBe(made.number);
		const after = await candidate(maker, again.slug, again.number);
		expect([after.version.note, after.version.checksum]).toEqual(['Changed words.', version.checksum]);
		await uploads.save(maker, made.id, 2, { ...ABOUT, dataset: 'gold-drude' });
		await expect(uploads.makeDraft(maker, made.id)).rejects.toBeInstanceOf(InvalidInput);
	});

	it('keeps a second table beside the file, and takes it along into the next version', async () => {
		const joined = '150;1,3;1,1\n100;1,1;0,6\n';
		const made = await draft({ ...ABOUT, joined });
		const { version } = await candidate(maker, made.slug, made.number);
		expect(version.table).toMatchObject({ joined, rowCount: 7, raw: { bytes: Buffer.byteLength(FILE) } });
		const answers = Object.fromEntries(
			version.checks.filter(({ severity }) => severity === 'warn').map(({ code }) => [code, 'Meant.'])
		);
		const { checksum } = version;
		await submit(maker, made.slug, made.number, { checksum, answers });
		await approve(reviewer, made.slug, made.number, { checksum });
		const next = await uploads.startFrom(maker, made.slug, made.number);
		expect((await uploads.get(maker, next)).form.joined).toBe(joined);
	});

	it('begins where an earlier version stands', async () => {
		const id = await uploads.startFrom(maker, 'gold-lorentz-drude', '1.0');
		const { form } = await uploads.get(maker, id);
		expect(form).toMatchObject({ dataset: 'gold-lorentz-drude', parent: '1.0' });
		await uploads.save(maker, id, 0, { ...form, note: 'Only words.' });
		const made = await uploads.makeDraft(maker, id);
		// The same numbers under another description are a minor step.
		expect(made.number).toBe('1.1');
		const { difference } = await candidate(maker, made.slug, made.number);
		expect(difference).toEqual({ figures: [], rows: [], rowCounts: null });
	});
});

describe('a review', () => {
	it('waits for others and not for the maker, shows what changes, and publishes once', async () => {
		const made = await submitted();
		const ref = `${made.slug}@${made.number}`;
		expect((await queue(maker)).find((one) => one.ref === ref)).toMatchObject({ own: true });
		expect((await queue(reviewer)).find((one) => one.ref === ref)).toMatchObject({ own: false });
		expect(await waitingFor(reviewer.id)).toBeGreaterThan(0);

		const seen = await candidate(reviewer, made.slug, made.number);
		expect(seen.before?.ref).toMatch(/^gold-johnson-christy@\d/);
		expect(seen.difference?.rowCounts).toMatchObject({ second: 5 });
		expect(seen.changes.length).toBeGreaterThan(3);
		// Most important first: a change of sign before any size of change.
		const order = seen.changes.map(({ signChanges, largestPercent }) => [signChanges, largestPercent ?? 0]);
		const sorted = [...order].sort((a, b) => Number(b[0]) - Number(a[0]) || Number(b[1]) - Number(a[1]));
		expect(order).toEqual(sorted);

		const outcomes = await Promise.allSettled(
			Array.from({ length: 50 }, () => approve(reviewer, made.slug, made.number, { checksum: made.checksum }))
		);
		expect(outcomes.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
		const [{ published }] = await database.sql`select count(*)::int as published from audit_entry
			where action = 'version.publish' and details ->> 'checksum' = ${made.checksum}`;
		expect(published).toBe(1);
		await expect(uploads.get(maker, made.id)).rejects.toBeInstanceOf(NotFound);
	}, 60_000);

	it('is told to whom it concerns, and read by them alone', async () => {
		const before = await unread(maker.id);
		expect(before).toBeGreaterThan(0);
		const { told } = await list(maker);
		expect(told[0]).toMatchObject({ subject: expect.stringContaining('is published'), read: false });
		expect(told[0].link.href).toMatch(/^\/datasets\//);
		await markRead(reviewer, told[0].id);
		expect(await unread(maker.id)).toBe(before);
		await markRead(maker, told[0].id);
		expect(await unread(maker.id)).toBe(before - 1);
		await markRead(maker);
		expect(await unread(maker.id)).toBe(0);
	});
});

describe('what is recommended', () => {
	it('is a stated choice, apart from the newest, and ends with a withdrawal', async () => {
		const made = await submitted();
		await expect(
			recommend(reviewer, made.slug, made.number, { reason: 'Too early.' })
		).rejects.toBeInstanceOf(StateError);
		await approve(reviewer, made.slug, made.number, { checksum: made.checksum });
		await recommend(reviewer, made.slug, made.number, { reason: 'The better film.' });
		const recommended = async () =>
			(await materials.get('gold')).datasets.find(({ slug }) => slug === made.slug)?.recommended;
		expect(await recommended()).toBe(made.number);
		await withdraw(reviewer, made.slug, made.number, { checksum: made.checksum, reason: 'A wrong film.' });
		expect(await recommended()).toBeNull();
		await expect(
			database.applicationSql`update dataset set recommended_major = 1, recommended_minor = 0 where slug = ${made.slug}`
		).rejects.toMatchObject({ constraint_name: 'dataset_change_audited' });
	}, 60_000);
});

describe('a table that leaves the library', () => {
	it('comes back to the same numbers, read by the guess alone', async () => {
		const tables = await database.sql<{ slug: string; number: string }[]>`
			select slug, major || '.' || minor as number from version join dataset on dataset.id = dataset_id
			where kind = 'table' and state = 'published' and raw is not null and published_by = 'installation' order by slug`;
		expect(tables.length).toBeGreaterThan(2);
		for (const { slug, number } of tables) {
			const original = await versions.get(slug, number);
			const started = await uploads.startFrom(maker, slug, number);
			const { 'column.1': _first, abscissaUnit: _unit, ...form } = (await uploads.get(maker, started)).form;
			const ends = Object.fromEntries(Object.entries(form).filter(([name]) => !name.startsWith('column.')));
			const csv = await tableCsv(original);
			const id = await uploads.start(maker, { raw: { name: 'table.csv', bytes: Buffer.from(csv) } }, ends);
			const made = await uploads.makeDraft(maker, id);
			const again = await candidate(maker, slug, made.number);
			expect([slug, again.version.checksum]).toEqual([slug, original.checksum]);
			expect([slug, again.version.fingerprint]).toEqual([slug, original.fingerprint]);
		}
	});
});

describe('a wrong listing entered as a new version', () => {
	/**
	 * Slips that were found between public listings of the fits of Rakic et al. 1998 (Applied Optics 37, 5271): the right figure, the
	 * wrong one, and what the comparison takes it for.
	 */
	it.each([
		['titanium-lorentz-drude', 19.43, 1.943, 'decimal point'],
		['copper-lorentz-drude', 2.957, 2.597, 'digits exchanged'],
		['aluminium-lorentz-drude', null, null, null],
		['nickel-brendel-bormann', 8.825, 6.637, null],
		['tungsten-brendel-bormann', 0.277, 0.227, 'one digit'],
		['aluminium-brendel-bormann', 2.145, 0.172, null]
	] as const)('is found in %s', async (slug, right, wrong, slip) => {
		const { model } = await versions.get(slug, '1.0');
		const text = JSON.stringify(model);
		const change =
			right === null ? null : new RegExp(`(?<=[:,])${String(right).replace('.', '\\.')}(?=[,}\\]])`);
		if (change) expect(text).toMatch(change);
		const id = await uploads.start(maker, {
			form: {
				dataset: slug,
				source: 'rakic-1998',
				model: change ? text.replace(change, String(wrong)) : text
			}
		});
		const made = await uploads.makeDraft(maker, id);
		const viewer = { personId: maker.id, isCurator: true };
		const query = comparisonQuery.parse({ a: `${slug}@1.0`, b: `${slug}@${made.number}` });
		const { difference, changes } = await compare(query, viewer);
		if (change) {
			expect(difference.figures).toEqual([expect.objectContaining({ from: right, to: wrong, slip })]);
			expect(changes.some(({ points }) => points.some(({ beyondBound }) => beyondBound))).toBe(true);
		} else {
			expect(difference.figures).toEqual([]);
		}
	});
});
