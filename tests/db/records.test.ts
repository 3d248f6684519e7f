import { createHash } from 'node:crypto';
import { strFromU8, unzipSync } from 'fflate';
import { beforeAll, describe, expect, it } from 'vitest';
import type { ForceRequest } from '../../src/lib/engine/contract.ts';
import { evaluate } from '../../src/lib/engine/index.ts';
import type { SignedIn } from '../../src/lib/schemas/person.ts';
import { recordContent, recordQuery, type RecordContent } from '../../src/lib/schemas/record.ts';
import { Conflict, Forbidden, InvalidInput, NotFound } from '../../src/lib/server/errors.ts';
import { withdraw } from '../../src/lib/server/library/curation.ts';
import { get as version } from '../../src/lib/server/library/versions.ts';
import { closeEnginePool } from '../../src/lib/server/compute/pool.ts';
import { deleteAccount } from '../../src/lib/server/people/account.ts';
import { freeze } from '../../src/lib/server/records/freeze.ts';
import { compare, recompute } from '../../src/lib/server/records/recompute.ts';
import { recordFile } from '../../src/lib/server/records/record-files.ts';
import * as records from '../../src/lib/server/records/records.ts';
import * as studies from '../../src/lib/server/studies/studies.ts';
import { slowForces } from '../support/slow-lifshitz.ts';
import { demoPeople } from '../support/curators.ts';
import { useDatabase } from '../support/database.ts';

/** Records: frozen for good, named by what they hold, seen by whom their owner says, and good for recomputing. */

const database = useDatabase();
const ORIGIN = 'http://localhost:4173';
const QUERY =
	'?left=gold-johnson-christy@1.0&medium=vacuum@1.0&right=silica-two-oscillators@1.0&T=295' +
	'&choice=As+measured&choice=Drude;left:gold-drude@1.0!drude&from=20&to=2000&at=38&mark=contact:21';
let people: Record<string, SignedIn>;

beforeAll(async () => {
	people = await demoPeople();
});

const how = { charge: () => Promise.resolve(), origin: ORIGIN, signal: new AbortController().signal };
const study = (actor: SignedIn, over: Partial<Parameters<typeof studies.create>[1]> = {}) =>
	studies.create(actor, {
		name: 'Gold over silica',
		query: QUERY,
		notes: 'As **agreed**.',
		reasons: ['As measured', 'The usual fit'],
		visibility: 'private',
		group: null,
		...over
	});
const frozen = async (
	actor: SignedIn,
	visibility: 'private' | 'group' | 'signed-in' | 'everybody' = 'private',
	over: Parameters<typeof study>[1] = {}
) => {
	const { id } = await study(actor, over);
	return freeze(actor, id, { revision: 1, authors: ['A. Researcher', 'B. Lead'], visibility }, how);
};
const hex = (text: string | Uint8Array) => createHash('sha256').update(text).digest('hex');

describe('freezing', () => {
	it('writes down everything, under the checksum of exactly that text', async () => {
		const { researcher } = people;
		const checksum = await frozen(researcher);
		const { record, text, own } = await records.get(researcher, checksum);
		expect(hex(text)).toBe(checksum);
		expect(own).toBe(true);
		const { content } = record;
		expect(content).toMatchObject({
			name: 'Gold over silica',
			title: 'Gold against silica, across vacuum',
			authors: ['A. Researcher', 'B. Lead'],
			notes: 'As **agreed**.',
			query: QUERY
		});
		expect(content.choices.map(({ letter, name, reason }) => [letter, name, reason])).toEqual([
			['A', 'As measured', 'As measured'],
			['B', 'Drude', 'The usual fit']
		]);
		expect(content.versions.map(({ ref }) => ref).sort()).toEqual([
			'gold-drude@1.0',
			'gold-johnson-christy@1.0',
			'silica-two-oscillators@1.0',
			'vacuum@1.0'
		]);
		for (const { points } of content.choices) {
			const separations = points.map(({ separationNm }) => separationNm);
			expect(separations).toEqual([...separations].sort((a, b) => a - b));
			for (const wanted of [20, 21, 38, 2000]) expect(separations).toContain(wanted);
			expect(points.length).toBeGreaterThan(100);
		}
		expect(await records.ofStudy(researcher, content.study.id)).toHaveLength(1);
	});

	it('is for who works on the study, in the state that they saw', async () => {
		const { researcher, reader } = people;
		const { id } = await study(researcher, { visibility: 'signed-in' });
		const fields = { revision: 1, authors: ['X'], visibility: 'private' as const };
		await expect(freeze(reader, id, fields, how)).rejects.toBeInstanceOf(Forbidden);
		await expect(freeze(researcher, id, { ...fields, revision: 2 }, how)).rejects.toBeInstanceOf(Conflict);
		await expect(freeze(researcher, id, { ...fields, visibility: 'group' }, how)).rejects.toBeInstanceOf(
			InvalidInput
		);
		await expect(
			freeze(people['researcher-2'], (await study(researcher)).id, fields, how)
		).rejects.toBeInstanceOf(NotFound);
	});

	it('takes no study that names what the library does not have', async () => {
		const { researcher } = people;
		const { id } = await study(researcher, { query: QUERY.replace('vacuum@1.0', 'vacuum@9.0') });
		await expect(
			freeze(researcher, id, { revision: 1, authors: ['X'], visibility: 'private' }, how)
		).rejects.toMatchObject({
			issues: [{ message: expect.stringContaining('vacuum@9.0 is not in the library') }]
		});
	});
});

describe('a record', () => {
	it('refuses every change, also by raw SQL and by the owner of the database', async () => {
		const checksum = await frozen(people.researcher);
		const statements = [
			`update record set content = '{}' where checksum = '${checksum}'`,
			`update record set name = 'Other' where checksum = '${checksum}'`,
			`update record set frozen_at = now() where checksum = '${checksum}'`,
			`update record set checksum = repeat('0', 64) where checksum = '${checksum}'`,
			`update record_pin set version_id = version_id where checksum = '${checksum}'`,
			`delete from record_pin where checksum = '${checksum}'`,
			`delete from record where checksum = '${checksum}'`,
			`truncate record cascade`,
			`truncate record_pin`
		];
		for (const statement of statements) {
			await expect(database.applicationSql.unsafe(statement), statement).rejects.toThrow();
			await expect(database.sql.unsafe(statement), statement).rejects.toMatchObject({
				constraint_name: expect.stringMatching(/^record_permanent$|_fk$/)
			});
		}
		const [{ content }] = await database.sql`select content from record where checksum = ${checksum}`;
		expect(hex(content as string)).toBe(checksum);
	});

	it('can only be stored under the checksum of its text', async () => {
		const checksum = await frozen(people.researcher);
		await expect(
			database.sql`insert into record select repeat('a', 64), content, study_id, name, frozen_by, frozen_at
				from record where checksum = ${checksum}`
		).rejects.toMatchObject({ constraint_name: 'record_checksum_true' });
	});

	it('keeps the versions it rests on', async () => {
		await frozen(people.researcher);
		await expect(
			database.sql`delete from version using record_pin where record_pin.version_id = version.id`
		).rejects.toThrow();
	});

	it('outlives the account of who froze it', async () => {
		const { 'reader-2': person, reader } = people;
		const checksum = await frozen(person, 'signed-in');
		await deleteAccount(person);
		expect((await records.get(reader, checksum)).record.content.authors).toEqual([
			'A. Researcher',
			'B. Lead'
		]);
	});
});

describe('who sees a record', () => {
	const canary = `canary-${Date.now().toString(36)}`;

	it('is its owner, the group, those who sign in, or everybody, and nobody finds what is not theirs', async () => {
		const { researcher, curator, lead, 'researcher-2': stranger } = people;
		const group = { group: 'cantilevers', visibility: 'group' as const, name: canary };
		const own = await frozen(researcher, 'private', { name: canary });
		const shared = await frozen(researcher, 'group', group);
		const open = await frozen(researcher, 'signed-in', { name: canary });
		const everybody = await frozen(researcher, 'everybody', { name: canary });

		const sees = async (reader: SignedIn | null) => {
			const seen = [];
			for (const [word, checksum] of Object.entries({ own, shared, open, everybody })) {
				const found = await records.get(reader, checksum).catch((error: unknown) => error);
				if (!(found instanceof NotFound)) seen.push(word);
			}
			return seen;
		};
		expect(await sees(researcher)).toEqual(['own', 'shared', 'open', 'everybody']);
		expect(await sees(curator)).toEqual(['shared', 'open', 'everybody']);
		expect(await sees(lead)).toEqual(['shared', 'open', 'everybody']);
		expect(await sees(stranger)).toEqual(['open', 'everybody']);
		expect(await sees(null)).toEqual(['everybody']);

		const listed = async (reader: SignedIn | null) => {
			const found = new Set<string>();
			for (const show of ['mine', 'group', 'open'] as const)
				for (const { checksum } of (
					await records.list(reader, { ...recordQuery.parse({}), show, search: canary })
				).records)
					found.add(checksum);
			return found;
		};
		expect(await listed(stranger)).toEqual(new Set([open, everybody]));
		expect(await listed(null)).toEqual(new Set([everybody]));
		expect(await listed(curator)).toEqual(new Set([shared, open, everybody]));
	});

	it('is for its owner to change, and the record stays as it is', async () => {
		const { researcher, reader } = people;
		const checksum = await frozen(researcher, 'private');
		await expect(records.share(reader, checksum, 'everybody')).rejects.toBeInstanceOf(NotFound);
		await records.share(researcher, checksum, 'everybody');
		await expect(records.share(reader, checksum, 'private')).rejects.toBeInstanceOf(Forbidden);
		expect(hex((await records.get(null, checksum)).text)).toBe(checksum);
	});
});

describe('recomputing', () => {
	it('gives identical bits, from threads that never saw it', async () => {
		const { researcher } = people;
		const checksum = await frozen(researcher);
		await closeEnginePool();
		const { content } = (await records.get(researcher, checksum)).record;
		const found = await recompute(content, how);
		expect(found).toMatchObject({ identical: true, differing: 0, largest: null });
		expect(found.compared).toBe(content.choices.reduce((sum, { points }) => sum + 3 * points.length, 0));
	}, 30_000);

	it('tells a difference against the sum of the bounds', async () => {
		const { researcher } = people;
		const checksum = await frozen(researcher);
		const { content } = (await records.get(researcher, checksum)).record;
		const changed = (by: number) =>
			content.choices.map(({ points }, choice) =>
				points.map((point, index) =>
					choice === 1 && index === 7 ? { ...point, pressurePa: point.pressurePa * (1 + by) } : point
				)
			);
		const bound = content.choices[1].points[7].errorBound.pressure;
		const within = compare(content.choices, changed(bound));
		expect(within).toMatchObject({
			identical: false,
			differing: 1,
			largest: { letter: 'B', quantity: 'pressure' }
		});
		expect(within.largest?.overBounds).toBeGreaterThan(0.4);
		expect(within.largest?.overBounds).toBeLessThan(0.6);
		expect(compare(content.choices, changed(10 * bound)).largest?.overBounds).toBeGreaterThan(4);
	});

	it('says of a withdrawn input that it is withdrawn, and goes on', async () => {
		const { researcher, 'curator-2': reviewer } = people;
		const query = QUERY.replaceAll('gold-johnson-christy@1.0', 'lead-drude@1.0');
		const checksum = await frozen(researcher, 'private', { query });
		const { checksum: of } = await version('lead-drude', '1.0');
		await withdraw(reviewer, 'lead-drude', '1.0', { checksum: of, reason: 'Another film.' });
		const { record } = await records.get(researcher, checksum);
		expect(record.flags).toEqual([{ ref: 'lead-drude@1.0', kind: 'withdrawn', words: 'Another film.' }]);
		expect((await records.list(researcher, recordQuery.parse({}))).records[0]).toMatchObject({
			checksum,
			withdrawn: 1
		});
		expect((await recompute(record.content, how)).identical).toBe(true);
	}, 30_000);
});

describe('the archive', () => {
	const unpacked = async (checksum: string): Promise<Map<string, string>> => {
		const file = await recordFile(await records.get(people.researcher, checksum), 'archive.zip', ORIGIN);
		const entries = Object.entries(unzipSync(file.content as Uint8Array));
		return new Map(
			entries.map(([name, bytes]) => [name.replace(/^record-[0-9a-f]{12}\//, ''), strFromU8(bytes)])
		);
	};

	it('recomputes the record without anything else', async () => {
		const checksum = await frozen(people.researcher);
		const files = await unpacked(checksum);
		expect(hex(files.get('record.json') ?? '')).toBe(checksum);
		const content: RecordContent = recordContent.parse(JSON.parse(files.get('record.json') ?? ''));
		for (const { letter, points, inputChecksum } of content.choices) {
			const text = files.get(`inputs/${letter}.json`) ?? '';
			expect(`sha256:${hex(text)}`).toBe(inputChecksum);
			const request = JSON.parse(text) as ForceRequest;
			expect(JSON.stringify(request)).not.toContain('"version"');
			expect(evaluate(request).points).toEqual(points);

			// And by the arithmetic of the tests, which shares nothing with the engine.
			const { separationNm, pressurePa, errorBound } = points[60];
			const slow = slowForces(request.arrangement, separationNm);
			expect(Math.abs(slow.pressurePa - pressurePa)).toBeLessThan(
				errorBound.pressure * Math.abs(pressurePa) + slow.estimatedError.pressure
			);
		}
	}, 60_000);

	it('has checksums that hold, models under the checksums of the record, and tables that say what they are', async () => {
		const checksum = await frozen(people.researcher);
		const files = await unpacked(checksum);
		const sums = (files.get('SHA256SUMS') ?? '').trim().split('\n');
		expect(sums).toHaveLength(files.size - 1);
		for (const line of sums) {
			const [sum, name] = line.split('  ');
			expect(hex(files.get(name) ?? ''), name).toBe(sum);
		}
		const content = recordContent.parse(JSON.parse(files.get('record.json') ?? ''));
		for (const { ref, checksum: of } of content.versions)
			expect(`sha256:${hex(files.get(`models/${ref.replace('@', '_')}.json`) ?? '')}`).toBe(of);
		const table = (files.get('tables/gold-johnson-christy_1.0.csv') ?? '').split('\n');
		expect(table.find((line) => !line.startsWith('#'))).toBe('photon energy,n,k');
		const curves = (files.get('results/curves.csv') ?? '')
			.split('\r\n')
			.filter((line) => !line.startsWith('#'));
		expect(curves[0].split(',').slice(0, 3)).toEqual(['separation', 'free_energy_A', 'free_energy_bound_A']);
		expect(curves[1].split(',').slice(0, 3)).toEqual(['nm', 'J/m^2', '1']);
		const first = curves[2].split(',').map(Number);
		expect(first.slice(0, 2)).toEqual([20, content.choices[0].points[0].freeEnergyJPerM2]);
		expect(files.get('README.txt')).toContain(`prints ${checksum}`);
		expect(files.get('citations.bib')).toContain('@article{johnson-christy-1972,');
		expect((files.get('citations.bib') ?? '').match(/^@\w+\{/gm)?.length).toBe(
			new Set((files.get('citations.bib') ?? '').match(/^@\w+\{[^,]+/gm)).size
		);
	});

	it('is the same bytes each time', async () => {
		const checksum = await frozen(people.researcher);
		const found = await records.get(people.researcher, checksum);
		const one = await recordFile(found, 'archive.zip', ORIGIN);
		const two = await recordFile(found, 'archive.zip', ORIGIN);
		expect(hex(one.content)).toBe(hex(two.content));
	});
});

describe('files of a record', () => {
	it('are what their names say', async () => {
		const found = await records.get(people.researcher, await frozen(people.researcher));
		const file = async (name: string) => (await recordFile(found, name, ORIGIN)).content;
		const pdf = Buffer.from((await file('sheet.pdf')) as Uint8Array).toString('latin1');
		expect(pdf.startsWith('%PDF-')).toBe(true);
		expect(pdf.match(/\/Type \/Page\b/g)).toHaveLength(1);
		expect(pdf).toContain('/MediaBox [0 0 595.28 841.89]');
		const json = JSON.parse((await file('curves.json')) as string) as {
			units: Record<string, string>;
			columns: Record<string, number[]>;
		};
		expect(json.units.pressure_B).toBe('Pa');
		expect(json.columns.pressure_B).toEqual(
			found.record.content.choices[1].points.map((point) => point.pressurePa)
		);
		expect(await file('citation.ris')).toMatch(/^TY {2}- DATA\r\nTI {2}- Gold over silica/);
		await expect(file('other.txt')).rejects.toBeInstanceOf(NotFound);
	});
});
