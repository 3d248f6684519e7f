import { readFile } from 'node:fs/promises';
import { describe, expect, it } from 'vitest';
import { modelDescription, tableDescription } from '../../src/lib/schemas/upload.ts';
import { Conflict, InvalidInput, NotFound, StateError } from '../../src/lib/server/errors.ts';
import { keepDataset, keepMaterial } from '../../src/lib/server/library/catalogue.ts';
import { draftFromModel, draftFromTable } from '../../src/lib/server/library/drafts.ts';
import { takeStep } from '../../src/lib/server/library/review.ts';
import { RefusedFile } from '../../src/lib/server/library/upload/refused-file.ts';
import * as versions from '../../src/lib/server/library/versions.ts';
import { useDatabase } from '../support/database.ts';

const db = useDatabase();

const RESEARCHER = 'researcher@larkmoor.example';
const CURATOR = 'curator@larkmoor.example';
const now = new Date('2026-03-01T12:00:00Z');

const description = (change: object = {}) =>
	modelDescription.parse({
		source: 'ordal-1985',
		quality: 'provisional',
		qualityReason: 'a test',
		...change
	});

const plasma = (plasmaEnergyEv: number) => ({ kind: 'plasma', plasmaEnergyEv }) as const;

const draft = (change: object = {}, energy = 5) =>
	db.database.transaction((tx) =>
		draftFromModel(
			tx,
			// A plasma agrees with no other vanadium of the library, and is meant to.
			{ datasetSlug: 'vanadium-drude', actor: RESEARCHER, answers: { agreement: 'A test.' } },
			plasma(energy),
			description(change)
		)
	);

const step = (
	name: Parameters<typeof takeStep>[1],
	versionId: string,
	checksum: string,
	actor: string,
	reason?: string
) => db.database.transaction((tx) => takeStep(tx, name, { versionId, checksum, actor, reason, now }));

const rowCounts = async () => {
	const [counts] = await db.sql`select (select count(*) from version) as versions,
		(select count(*) from check_result) as checks, (select count(*) from audit_entry) as entries`;
	return counts;
};

describe('a draft', () => {
	it('takes the next major number and its audit row', async () => {
		const first = await draft();
		const second = await draft({ parent: '1.0' });
		expect(Number(second.number.split('.')[0])).toBe(Number(first.number.split('.')[0]) + 1);
		const entries =
			await db.sql`select action, actor, to_state from audit_entry where object_id = ${second.id}`;
		expect([...entries]).toEqual([{ action: 'version.create', actor: RESEARCHER, to_state: 'draft' }]);
	});

	it.each<[string, object]>([
		['a source that is not there', { source: 'nobody-1900' }],
		['a parent that is not there', { parent: '77.0' }]
	])('is refused with %s, and nothing is left', async (_what, change) => {
		const before = await rowCounts();
		await expect(draft(change)).rejects.toBeInstanceOf(InvalidInput);
		expect(await rowCounts()).toEqual(before);
	});

	it('is refused where the engine could not compute it', async () => {
		await expect(draft({}, -1)).rejects.toBeInstanceOf(InvalidInput);
	});

	it('is refused without its dataset', async () => {
		const lost = db.database.transaction((tx) =>
			draftFromModel(tx, { datasetSlug: 'nowhere', actor: RESEARCHER }, plasma(1), description())
		);
		await expect(lost).rejects.toBeInstanceOf(NotFound);
	});

	it('from a bad file leaves nothing half-stored', async () => {
		const before = await rowCounts();
		const bad = Buffer.from('1,2,3\n2,x,1\n3,1,-4\n');
		const reading = tableDescription.parse({
			...description(),
			delimiter: ',',
			decimal: '.',
			abscissa: { column: 1, unit: 'eV' },
			ordinates: [
				{ column: 2, quantity: 'n' },
				{ column: 3, quantity: 'k' }
			]
		});
		const attempt = db.database.transaction((tx) =>
			draftFromTable(
				tx,
				{ datasetSlug: 'vanadium-drude', actor: RESEARCHER },
				{ name: 'bad.csv', bytes: bad },
				reading
			)
		);
		await expect(attempt).rejects.toMatchObject({
			issues: [
				{ line: 2, column: 2, rule: 'number', text: 'x' },
				{ line: 3, column: 3, rule: 'passivity', text: '-4' }
			]
		});
		await expect(attempt).rejects.toBeInstanceOf(RefusedFile);
		expect(await rowCounts()).toEqual(before);
	});

	it('of the same numbers in another file has the same fingerprint', async () => {
		const text = await readFile('data-seed/silver/silver-johnson-christy.csv', 'utf8');
		const rows = text.split('\n').filter((line) => /^\d/.test(line));
		const inNm = rows.map((line) => {
			const [energy, n, k] = line.split(',');
			return `${1239.841984332 / Number(energy)};${Number(n).toFixed(4)};${k}`.replaceAll('.', ',');
		});
		const reading = tableDescription.parse({
			...description(),
			abscissa: { column: 1, unit: 'nm' },
			ordinates: [
				{ column: 2, quantity: 'n' },
				{ column: 3, quantity: 'k' }
			]
		});
		const copy = await db.database.transaction((tx) =>
			draftFromTable(
				tx,
				{ datasetSlug: 'silver-johnson-christy', actor: RESEARCHER },
				{ name: 'copy.csv', bytes: Buffer.from(inNm.join('\r\n')) },
				reading
			)
		);
		const [{ fingerprint }] = await db.sql`select fingerprint from version where id = ${copy.id}`;
		expect(fingerprint).toBe((await versions.get('silver-johnson-christy', '1.0')).fingerprint);
	});
});

describe('a step', () => {
	it('goes from draft to published and withdrawn, each with its audit row', async () => {
		const { id, checksum, number } = await draft({}, 6);
		await step('submit', id, checksum, RESEARCHER);
		await step('publish', id, checksum, CURATOR);
		expect(await versions.get('vanadium-drude', number)).toMatchObject({
			state: 'published',
			publishedBy: CURATOR,
			publishedAt: now.toISOString()
		});
		await step('withdraw', id, checksum, CURATOR, 'the sample was another alloy');
		const entries =
			await db.sql`select action, from_state, to_state, details from audit_entry where object_id = ${id} order by id`;
		expect(entries.map(({ from_state: from, to_state: to }) => [from, to])).toEqual([
			[null, 'draft'],
			['draft', 'in_review'],
			['in_review', 'published'],
			['published', 'withdrawn']
		]);
		expect(entries[3].details).toMatchObject({ reason: 'the sample was another alloy', checksum });
	});

	it('is refused in another state, with a stale checksum, and for a version that is not there', async () => {
		const { id, checksum } = await draft({}, 7);
		await expect(step('publish', id, checksum, CURATOR)).rejects.toBeInstanceOf(StateError);
		await step('submit', id, checksum, RESEARCHER);
		await expect(step('publish', id, `sha256:${'0'.repeat(64)}`, CURATOR)).rejects.toBeInstanceOf(Conflict);
		const nobody = '00000000-0000-0000-0000-000000000000';
		await expect(step('submit', nobody, checksum, CURATOR)).rejects.toBeInstanceOf(NotFound);
	});

	it('happens once when fifty approve at once', async () => {
		const { id, checksum } = await draft({}, 8);
		await step('submit', id, checksum, RESEARCHER);
		const outcomes = await Promise.allSettled(
			Array.from({ length: 50 }, (_, index) => step('publish', id, checksum, `reviewer-${index}`))
		);
		const refused = outcomes.filter((outcome) => outcome.status === 'rejected');
		expect(refused).toHaveLength(49);
		expect(refused.every(({ reason }) => reason instanceof StateError)).toBe(true);
	});

	it('does not let anybody publish what they submitted', async () => {
		const { id, checksum } = await draft({}, 9);
		await step('submit', id, checksum, CURATOR);
		await expect(step('publish', id, checksum, CURATOR)).rejects.toMatchObject({
			cause: { constraint_name: 'version_published_by_another' }
		});
	});
});

describe('the catalogue', () => {
	it('brings a material up to date under the same address', async () => {
		const before = await db.sql`select id, notes from material where slug = 'lead'`;
		await db.database.transaction((tx) =>
			keepMaterial(
				tx,
				{
					slug: 'lead',
					name: 'Lead',
					formula: 'Pb',
					class: 'metal',
					densityGPerCm3: 11.34,
					aliases: ['plumbum'],
					casNumber: null,
					staticPermittivity: null,
					staticPermittivitySource: null,
					refractiveIndexD: null,
					notes: 'Superconducting below 7.2 K.',
					hazards: null
				},
				CURATOR
			)
		);
		const [after] = await db.sql`select id, notes, search_text from material where slug = 'lead'`;
		expect(after).toMatchObject({ id: before[0].id, notes: 'Superconducting below 7.2 K.' });
		expect(after.search_text).toContain('plumbum');
	});

	it('does not move a dataset to another material', async () => {
		const move = db.database.transaction((tx) =>
			keepDataset(tx, { slug: 'lead-drude', title: 'Drude', material: 'tungsten' }, CURATOR)
		);
		await expect(move).rejects.toBeInstanceOf(Conflict);
	});
});
