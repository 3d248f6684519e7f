import { beforeAll, describe, expect, it } from 'vitest';
import { POST } from '../../src/routes/api/v1/datasets/[slug]/versions/+server.ts';
import type { SignedIn } from '../../src/lib/schemas/person.ts';
import { asForm, call, demoPeople } from '../support/curators.ts';
import { useDatabase } from '../support/database.ts';
import { hostileFile, literal } from '../support/hostile-files.ts';

/** No file brings the application down, none is taken otherwise than a literal reader takes it, and a refused one leaves nothing. */

const CASES = Number(process.env.HAIRSBREADTH_HOSTILE_FILES ?? 1000);
const SEED = 20_261;

const db = useDatabase();
let curator: SignedIn;

beforeAll(async () => {
	({ curator } = await demoPeople());
	await db.sql`insert into dataset (slug, title, material_id) select 'hostile', 'Hostile files', id from material where slug = 'gold'`;
});

const close = (a: number, b: number) => Math.abs(a - b) <= 1e-12 * Math.max(Math.abs(a), Math.abs(b));

describe('the reader of the oracle', () => {
	it.each([
		['1.5', 1.5],
		['+.5e-3', 5e-4],
		['1.', 1],
		['', null],
		['1,5', null],
		['0x1', null],
		['1e999', null],
		['1e-400', null],
		['0e-400', 0],
		['1 2', null]
	])('takes %s for %s', (text, value) => {
		expect(literal(text, '.')).toBe(value);
	});
});

describe('hostile files', () => {
	it(`are read as a literal reader reads them, ${CASES} of them`, async () => {
		const wrong: string[] = [];
		let taken = 0;
		for (let index = 0; index < CASES; index += 1) {
			const { what, bytes, description, expected } = hostileFile(SEED, index);
			const [{ before }] = await db.sql`select count(*)::int as before from version`;
			const answer = await call(POST as never, curator, { slug: 'hostile' }, asForm(bytes, description));
			const [{ after }] = await db.sql`select count(*)::int as after from version`;
			const tell = (why: string) => wrong.push(`file ${index}, ${what}: ${why}`);
			if (answer.status >= 500) tell(`answered ${answer.status}`);
			if (!expected) {
				if (answer.status < 400 || ![413, 415, 422].includes(answer.status))
					tell(`was taken (${answer.status})`);
				else if (after !== before) tell('left a row behind');
				continue;
			}
			if (answer.status !== 201) {
				tell(`was refused (${answer.status}): ${(await answer.text()).slice(0, 200)}`);
				continue;
			}
			taken += 1;
			const { version } = (await answer.json()) as { version: { number: string } };
			const [major, minor] = version.number.split('.').map(Number);
			const [row] = await db.sql`select version.id, model from version join dataset on dataset.id = dataset_id
				where slug = 'hostile' and major = ${major} and minor = ${minor}`;
			const { energiesEv, epsilon2 } = row.model as { energiesEv: number[]; epsilon2: number[] };
			const same =
				energiesEv.length === expected.energiesEv.length &&
				energiesEv.every((value, at) => close(value, expected.energiesEv[at])) &&
				epsilon2.every((value, at) => close(value, expected.epsilon2[at]));
			if (!same) tell('came out as other numbers');
			await db.sql.begin(async (sql) => {
				await sql`delete from version_source where version_id = ${row.id}`;
				await sql`delete from check_result where version_id = ${row.id}`;
				await sql`delete from version where id = ${row.id}`;
			});
		}
		expect(wrong.slice(0, 20)).toEqual([]);
		// Both verdicts are exercised.
		expect(taken).toBeGreaterThan(CASES / 10);
		expect(taken).toBeLessThan(CASES * 0.9);
	}, 600_000);
});
