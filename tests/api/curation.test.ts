import { beforeAll, describe, expect, it } from 'vitest';
import type { SignedIn } from '../../src/lib/schemas/person.ts';
import { POST as postMaterial } from '../../src/routes/api/v1/materials/+server.ts';
import { POST as postSource } from '../../src/routes/api/v1/sources/+server.ts';
import { POST as postDataset } from '../../src/routes/api/v1/datasets/+server.ts';
import { POST as postVersion } from '../../src/routes/api/v1/datasets/[slug]/versions/+server.ts';
import { GET as getVersion } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/+server.ts';
import { GET as getRaw } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/raw/+server.ts';
import { GET as getTable } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/table.csv/+server.ts';
import { POST as submit } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/submit/+server.ts';
import { POST as approve } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/approve/+server.ts';
import { POST as giveBack } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/return/+server.ts';
import { POST as withdraw } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/withdraw/+server.ts';
import { asForm, asJson, call, demoPeople } from '../support/curators.ts';
import { useDatabase } from '../support/database.ts';

const db = useDatabase();

let curator: SignedIn;
let second: SignedIn;
let researcher: SignedIn;

beforeAll(async () => {
	const people = await demoPeople();
	curator = people['curator'];
	second = people['curator-2'];
	researcher = people['researcher'];
	await call(postSource, curator, {}, asJson(SOURCE));
	await call(postDataset, curator, {}, asJson(DATASET));
});

const SOURCE = {
	slug: 'larkmoor-2026',
	title: 'Ellipsometry of evaporated films',
	authors: ['Larkmoor Gap Laboratory'],
	year: 2026,
	kind: 'measurement',
	licence: 'CC-BY-4.0'
};
const DATASET = { slug: 'gold-larkmoor', title: 'Larkmoor film', material: 'gold' };

const READING = {
	abscissa: { column: 1, unit: 'nm' },
	ordinates: [
		{ column: 2, quantity: 'n' },
		{ column: 3, quantity: 'k' }
	],
	lowEnd: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
	highEnd: { kind: 'power', exponent: 3 },
	source: 'larkmoor-2026'
};
const TABLE = 'wavelength;n;k\nnm;1;1\n600,5;0,2;3,1\n550;0,35;2,7\n500;0,85;1,85\n450;1,4;1,9\n';

const at = (number: string) => ({ slug: 'gold-larkmoor', number });
const NEW = { slug: 'gold-larkmoor' };

interface Version {
	number: string;
	state: string;
	checksum: string;
	checks: { code: string; severity: string; answer: string | null }[];
}
interface Answer {
	version: Version;
	error: { code: string; message: string; issues?: Record<string, unknown>[] };
}

const read = async (response: Response) => (await response.json()) as Answer;

async function aDraft(file = TABLE, reading: object = READING): Promise<Version> {
	const made = await call(postVersion, curator, NEW, asForm(file, reading));
	expect(made.status).toBe(201);
	return (await read(made)).version;
}

const answersTo = ({ checks }: Version) =>
	Object.fromEntries(
		checks.filter(({ severity }) => severity === 'warn').map(({ code }) => [code, 'it is a test'])
	);

async function inReview(file?: string): Promise<Version> {
	const draft = await aDraft(file);
	const { checksum, number } = draft;
	const body = { checksum, answers: answersTo(draft) };
	const done = await call(submit, curator, at(number), asJson(body));
	expect(done.status).toBe(200);
	return (await read(done)).version;
}

const counts = async () => {
	const [row] = await db.sql`select (select count(*) from version) as versions,
		(select count(*) from check_result) as checks, (select count(*) from version_source) as sources,
		(select count(*) from audit_entry) as entries, (select count(*) from outbox) as mails`;
	return row;
};

describe('POST /api/v1/{materials,sources,datasets}', () => {
	it('makes each once, and tells who comes second', async () => {
		const material = { slug: 'larkmoor-glass', name: 'Larkmoor glass', class: 'insulator' };
		const made = await call(postMaterial, curator, {}, asJson(material));
		expect(made.status).toBe(201);
		expect(await made.json()).toMatchObject({ material: { slug: 'larkmoor-glass', datasetCount: 0 } });
		expect((await call(postMaterial, second, {}, asJson(material))).status).toBe(409);
		expect((await call(postSource, second, {}, asJson(SOURCE))).status).toBe(409);
		expect((await call(postDataset, second, {}, asJson(DATASET))).status).toBe(409);
	});

	it.each([
		[postMaterial, { slug: 'A b', name: 'x', class: 'metal' }, 'slug'],
		[postMaterial, { slug: 'x', name: 'bad\u0000name', class: 'metal' }, 'name'],
		[postMaterial, { slug: 'x', name: 'half \ud800', class: 'metal' }, 'name'],
		[postMaterial, { slug: 'x', name: 'x', class: 'plasma' }, 'class'],
		[postSource, { ...SOURCE, slug: 'y', doi: 'https://doi.org/10.1/x' }, 'doi'],
		[postSource, { ...SOURCE, slug: 'y', url: 'javascript:alert(1)' }, 'url'],
		[postSource, { ...SOURCE, slug: 'y', colour: 'red' }, 'colour'],
		[postDataset, { slug: 'x', title: ' ', material: 'gold' }, 'title']
	])('names the field that is wrong', async (handler, body, path) => {
		const answer = await call(handler, curator, {}, asJson(body));
		expect(answer.status).toBe(422);
		expect((await read(answer)).error.issues).toContainEqual(expect.objectContaining({ path }));
	});

	it('does not make a dataset of a material that is not there', async () => {
		const body = { slug: 'x-y', title: 'x', material: 'unobtainium' };
		expect((await call(postDataset, curator, {}, asJson(body))).status).toBe(404);
	});
});

describe('POST .../versions', () => {
	it('answers with the draft, its number, its checks and where it is', async () => {
		const made = await call(postVersion, curator, NEW, asForm(TABLE, READING));
		expect(made.status).toBe(201);
		const { version } = await read(made);
		expect(made.headers.get('location')).toBe(`/api/v1/datasets/gold-larkmoor/versions/${version.number}`);
		expect(version).toMatchObject({ state: 'draft', quality: 'provisional', kind: 'table' });
		expect(version.checks.map(({ code }) => code)).toContain('passivity');
	});

	it('gives the bytes back as they came and the numbers to the last digit', async () => {
		const bytes = new TextEncoder().encode(`\ufeff${TABLE}`.replaceAll('\n', '\r\n'));
		const made = await call(postVersion, curator, NEW, asForm(bytes, READING));
		const { number } = (await read(made)).version;
		const raw = await call(getRaw, curator, at(number));
		expect(new Uint8Array(await raw.arrayBuffer())).toEqual(bytes);
		const csv = await (await call(getTable, curator, at(number))).text();
		const again = await call(
			postVersion,
			curator,
			NEW,
			asForm(csv, { ...READING, delimiter: ',', decimal: '.' })
		);
		const [first, copy] = await db.sql`select checksum from version
			where major in (${Number(number.split('.')[0])}, ${Number((await read(again)).version.number.split('.')[0])})
				and dataset_id = (select id from dataset where slug = 'gold-larkmoor')`;
		expect(copy.checksum).toBe(first.checksum);
	});

	it('keeps a column of uncertainties beside its values', async () => {
		const file = '1,2,1,0.05\n2,3,1,0.06\n';
		const made = await call(
			postVersion,
			curator,
			NEW,
			asForm(file, {
				...READING,
				abscissa: { column: 1, unit: 'eV' },
				ordinates: [...READING.ordinates, { column: 4, uncertaintyOf: 3 }],
				delimiter: ',',
				decimal: '.'
			})
		);
		expect(made.status).toBe(201);
		const { number } = (await read(made)).version;
		const csv = await (await call(getTable, curator, at(number))).text();
		expect(csv).toContain('uncertainty of k');
		expect(csv).toContain('2,3,1,0.06');
	});

	it('takes a closed form as JSON', async () => {
		const body = {
			model: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
			description: { source: 'larkmoor-2026' }
		};
		const made = await call(postVersion, curator, NEW, asJson(body));
		expect(made.status).toBe(201);
		expect((await read(made)).version).toMatchObject({ kind: 'model', modelKind: 'drude' });
	});

	it('refuses a file with every problem at its place, and leaves no row behind', async () => {
		const before = await counts();
		const answer = await call(
			postVersion,
			curator,
			NEW,
			asForm('600;0,2;3\n550;x;2,7\n500;0,8;-1\n450;0x1;2\n', READING)
		);
		expect(answer.status).toBe(422);
		expect((await read(answer)).error.issues).toEqual([
			expect.objectContaining({ line: 2, column: 2, rule: 'number', text: 'x' }),
			expect.objectContaining({ line: 3, column: 3, rule: 'passivity', text: '-1' }),
			expect.objectContaining({ line: 4, column: 2, rule: 'number', text: '0x1' })
		]);
		expect(await counts()).toEqual(before);
	});

	it('asks about a file that reads two ways', async () => {
		const answer = await call(postVersion, curator, NEW, asForm('0,5,1,2\n0,6,1,3\n', READING));
		expect(answer.status).toBe(422);
		expect((await read(answer)).error.code).toBe('ambiguous');
	});

	it.each([
		['gzip', [0x1f, 0x8b, 8, 0]],
		['zip', [0x50, 0x4b, 3, 4]],
		['PDF', [0x25, 0x50, 0x44, 0x46]],
		['PNG', [0x89, 0x50, 0x4e, 0x47]]
	])('answers 415 to %s without opening it', async (_what, magic) => {
		const bytes = Uint8Array.from([...magic, 1, 2, 3]);
		expect((await call(postVersion, curator, NEW, asForm(bytes, READING))).status).toBe(415);
	});

	it('answers 413 to a file that is too large', async () => {
		const bytes = new Uint8Array(5_000_001).fill(0x31);
		expect((await call(postVersion, curator, NEW, asForm(bytes, READING))).status).toBe(413);
	});

	it.each<[string, RequestInit, number]>([
		['a description that is not JSON', asForm(TABLE, '{'), 422],
		['no description', { method: 'POST', body: new FormData() }, 422],
		['a source that is not there', asForm(TABLE, { ...READING, source: 'nobody-1900' }), 422],
		['a source with a NUL', asForm(TABLE, { ...READING, source: 'a\u0000b' }), 422],
		['a note with half a character', asForm(TABLE, { ...READING, note: '\ud800' }), 422],
		['a parent that is not there', asForm(TABLE, { ...READING, parent: '99.0' }), 422],
		['a range that runs backwards', asForm(TABLE, { ...READING, validRangeEv: { low: 2, high: 1 } }), 422],
		['an unknown field', asForm(TABLE, { ...READING, colour: 'red' }), 422],
		[
			'an uncertainty of nothing',
			asForm(TABLE, { ...READING, ordinates: [...READING.ordinates, { column: 4, uncertaintyOf: 9 }] }),
			422
		],
		['plain text', { method: 'POST', body: 'x', headers: { 'content-type': 'text/plain' } }, 415],
		[
			'a broken form',
			{ method: 'POST', body: 'x', headers: { 'content-type': 'multipart/form-data; boundary=y' } },
			400
		]
	])('answers %s with a reason', async (_what, init, status) => {
		const before = await counts();
		const answer = await call(postVersion, curator, NEW, init);
		expect(answer.status).toBe(status);
		expect((await read(answer)).error.message.length).toBeGreaterThan(10);
		expect(await counts()).toEqual(before);
	});

	it.each(['no-such-dataset', 'with\u0000nul', "o'hara; drop table version"])(
		'answers 404 for the dataset %j',
		async (slug) => {
			expect((await call(postVersion, curator, { slug }, asForm(TABLE, READING))).status).toBe(404);
		}
	);
});

describe('an Idempotency-Key', () => {
	const keyed = (key: string, body: unknown = DATASET_OF_KEY) => asJson(body, { 'idempotency-key': key });
	const DATASET_OF_KEY = { slug: 'gold-keyed', title: 'Keyed', material: 'gold' };

	it('does a request once and answers it the same again', async () => {
		const first = await call(postDataset, curator, {}, keyed('k-1'));
		const again = await call(postDataset, curator, {}, keyed('k-1'));
		expect([first.status, again.status]).toEqual([201, 201]);
		expect(await again.json()).toEqual(await first.json());
		expect(again.headers.get('idempotency-replayed')).toBe('true');
	});

	it('makes one draft of twenty uploads at once', async () => {
		const before = await counts();
		const init = () => asForm(TABLE, READING, { headers: { 'idempotency-key': 'k-2' } });
		const answers = await Promise.all(
			Array.from({ length: 20 }, () => call(postVersion, curator, NEW, init()))
		);
		expect(answers.every(({ status }) => status === 201 || status === 409)).toBe(true);
		expect(Number((await counts()).versions)).toBe(Number(before.versions) + 1);
	});

	it('is not taken for another request, and is each person’s own', async () => {
		const other = { ...DATASET_OF_KEY, slug: 'gold-keyed-2' };
		expect((await call(postDataset, curator, {}, keyed('k-1', other))).status).toBe(422);
		expect((await call(postDataset, second, {}, keyed('k-1', other))).status).toBe(201);
		expect((await call(postDataset, curator, {}, keyed('k'.repeat(201)))).status).toBe(422);
	});
});

describe('a draft', () => {
	it('is hidden from everybody but its maker', async () => {
		const { number } = await aDraft();
		expect((await call(getVersion, curator, at(number))).status).toBe(200);
		for (const other of [second, researcher, null])
			expect((await call(getVersion, other, at(number))).status).toBe(404);
	});

	it('is not submitted while a warning has no answer', async () => {
		const draft = await aDraft();
		const answer = await call(submit, curator, at(draft.number), asJson({ checksum: draft.checksum }));
		expect(answer.status).toBe(422);
		const paths = (await read(answer)).error.issues?.map(({ path }) => path);
		expect(paths).toEqual(Object.keys(answersTo(draft)).map((code) => `answers.${code}`));
		expect(paths?.length).toBeGreaterThan(0);
	});

	it('is not submitted by another, nor with an answer to no warning, nor with a checksum that has moved on', async () => {
		const draft = await aDraft();
		const body = { checksum: draft.checksum, answers: answersTo(draft) };
		expect((await call(submit, second, at(draft.number), asJson(body))).status).toBe(404);
		const stray = { ...body, answers: { ...body.answers, passivity: 'x' } };
		expect((await call(submit, curator, at(draft.number), asJson(stray))).status).toBe(422);
		const stale = { ...body, checksum: `sha256:${'0'.repeat(64)}` };
		expect((await call(submit, curator, at(draft.number), asJson(stale))).status).toBe(409);
	});
});

describe('a review', () => {
	it('goes from draft to published, and tells both sides', async () => {
		const draft = await aDraft();
		await db.sql`update outbox set state = 'void', sealed = null where state = 'waiting'`;
		const body = { checksum: draft.checksum, answers: answersTo(draft) };
		expect((await call(submit, curator, at(draft.number), asJson(body))).status).toBe(200);
		expect((await call(getVersion, second, at(draft.number))).status).toBe(200);
		expect((await call(getVersion, researcher, at(draft.number))).status).toBe(404);
		const approved = await call(approve, second, at(draft.number), asJson({ checksum: draft.checksum }));
		expect(approved.status).toBe(200);
		expect((await read(approved)).version).toMatchObject({ state: 'published', publishedBy: second.name });
		expect((await call(getVersion, null, at(draft.number))).status).toBe(200);
		const mails = await db.sql`select kind, recipient from outbox where state = 'waiting' order by id`;
		expect([...mails]).toEqual([
			{ kind: 'review-wanted', recipient: second.email },
			{ kind: 'version-published', recipient: curator.email }
		]);
		const told = await db.sql`select kind from notification where person_id = ${curator.id}`;
		expect(told.map(({ kind }) => kind)).toContain('version-published');
	});

	it('is never one’s own', async () => {
		const { number, checksum } = await inReview();
		for (const step of [approve, giveBack]) {
			const own = await call(step, curator, at(number), asJson({ checksum, reason: 'mine' }));
			expect(own.status).toBe(403);
		}
	});

	it('is refused with a checksum that the version does not have', async () => {
		const { number } = await inReview();
		const stale = asJson({ checksum: `sha256:${'0'.repeat(64)}` });
		expect((await call(approve, second, at(number), stale)).status).toBe(409);
	});

	it('gives back with a reason, and is not approved as what it was before', async () => {
		const { number, checksum } = await inReview();
		const [{ submitted_at: earlier }] = await db.sql`select submitted_at from version
			where checksum = ${checksum} and state = 'in_review' order by submitted_at desc limit 1`;
		expect((await call(giveBack, second, at(number), asJson({ checksum }))).status).toBe(422);
		const reason = 'the k at 500 nm is another sample';
		expect((await call(giveBack, second, at(number), asJson({ checksum, reason }))).status).toBe(200);
		expect((await call(approve, second, at(number), asJson({ checksum }))).status).toBe(404);
		expect((await call(submit, curator, at(number), asJson({ checksum }))).status).toBe(200);
		const submittedAt = (earlier as Date).toISOString();
		expect((await call(approve, second, at(number), asJson({ checksum, submittedAt }))).status).toBe(409);
		expect((await call(approve, second, at(number), asJson({ checksum }))).status).toBe(200);
	});

	it('publishes once when fifty approve at once', async () => {
		const { number, checksum } = await inReview();
		const answers = await Promise.all(
			Array.from({ length: 50 }, () => call(approve, second, at(number), asJson({ checksum })))
		);
		const statuses = answers.map(({ status }) => status).sort();
		expect(statuses).toEqual([200, ...Array.from({ length: 49 }, () => 409)]);
		const entries = await db.sql`select from audit_entry where action = 'version.publish'
			and object_id = (select id::text from version where checksum = ${checksum} and state = 'published'
				order by published_at desc limit 1)`;
		expect(entries.length).toBe(1);
	});

	it('withdraws with a reason, keeping the address', async () => {
		const { number, checksum } = await inReview();
		await call(approve, second, at(number), asJson({ checksum }));
		expect((await call(withdraw, second, at(number), asJson({ checksum }))).status).toBe(422);
		const reason = 'the film was an alloy';
		const gone = await call(withdraw, second, at(number), asJson({ checksum, reason }));
		expect(gone.status).toBe(200);
		const shown = await (await call(getVersion, null, at(number))).json();
		expect(shown).toMatchObject({
			version: { state: 'withdrawn', withdrawn: { reason, by: second.name } }
		});
		expect((await call(withdraw, second, at(number), asJson({ checksum, reason }))).status).toBe(409);
	});
});

describe('a version that starts from another', () => {
	it('takes a minor step where no number changed and a major one where any did', async () => {
		const { number, checksum } = await inReview();
		await call(approve, second, at(number), asJson({ checksum }));
		const major = Number(number.split('.')[0]);
		const described = await aDraft(TABLE, { ...READING, parent: number, note: 'The same, told better.' });
		expect(described.number).toBe(`${major}.1`);
		const changed = await aDraft(TABLE.replace('2,7', '2,71'), { ...READING, parent: number });
		expect(Number(changed.number.split('.')[0])).toBeGreaterThan(major);
		const otherEnd = { ...READING, parent: number, highEnd: { kind: 'power', exponent: 4 } };
		expect((await aDraft(TABLE, otherEnd)).number.endsWith('.0')).toBe(true);
	});
});
