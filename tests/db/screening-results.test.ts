import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import type { SignedIn } from '../../src/lib/schemas/person.ts';
import { newScreening } from '../../src/lib/schemas/screening.ts';
import { decodeStudy } from '../../src/lib/schemas/study-address.ts';
import { materialIn } from '../../src/lib/schemas/study-slots.ts';
import { runChunk } from '../../src/lib/server/screening/chunks.ts';
import { csv, differences, json } from '../../src/lib/server/screening/exports.ts';
import { resultsOf } from '../../src/lib/server/screening/results.ts';
import { grid, rows } from '../../src/lib/server/screening/rows.ts';
import * as screenings from '../../src/lib/server/screening/screenings.ts';
import { permittivityOrder } from '../../src/lib/server/screening/why.ts';
import { submit, approve } from '../../src/lib/server/library/curation.ts';
import { candidate } from '../../src/lib/server/library/reviewing.ts';
import * as uploads from '../../src/lib/server/library/uploads.ts';
import { demoPeople } from '../support/curators.ts';
import { useDatabase } from '../support/database.ts';

/** What a screening says: published facts appear, rows are ranked by what they claim, and leave as files. */

const database = useDatabase();
let people: Record<string, SignedIn>;

beforeAll(async () => {
	people = await demoPeople();
});

/** States a screening and computes it here, chunk by chunk, as a worker would. */
async function screened(statement: Record<string, unknown>, again?: string) {
	const { researcher } = people;
	const { id } = again
		? await screenings.repeat(researcher, again)
		: await screenings.create(researcher, newScreening.parse({ name: 'Here', statement }));
	const chunks =
		await database.sql`select position from screening_chunk where screening_id = ${id} order by position desc`;
	for (const { position } of chunks)
		expect(
			await runChunk({ screening: id, position: position as number }, new AbortController().signal)
		).toBe('done');
	// A chunk that comes twice, as after the loss of a worker, changes nothing.
	expect(await runChunk({ screening: id, position: 0 }, new AbortController().signal)).toBe('given up');
	const found = await screenings.get(researcher, id);
	expect(found.screening.state).toBe('finished');
	const { plan, statement: kept, chunksDone, cells } = found.row;
	return { found, plan, ...(await resultsOf({ id, plan, criterion: kept.criterion, chunksDone, cells })) };
}

interface Triplet {
	left: string;
	medium: string;
	right: string;
	separationsNm: number[];
	sign: 'repulsive' | 'attractive';
	source: string;
}
const { triplets } = JSON.parse(readFileSync('tests/reference/repulsive-triplets.json', 'utf8')) as {
	triplets: Triplet[];
};
const ALL_VERSIONS = async (slug: string): Promise<string[]> => {
	const found = await database.sql`select dataset.slug || '@' || major || '.' || minor as ref from version
		join dataset on dataset.id = dataset_id join material on material.id = material_id
		where material.slug = ${slug} and state = 'published'`;
	return found.map(({ ref }) => ref as string);
};

describe('published signs', () => {
	it.each(triplets)(
		'$left, $medium, $right: $sign, or the data are said to disagree ($source)',
		async (one) => {
			const { plan, results, ranking } = await screened({
				left: { versions: await ALL_VERSIONS(one.left) },
				medium: { versions: await ALL_VERSIONS(one.medium) },
				right: { versions: await ALL_VERSIONS(one.right) },
				separationsNm: one.separationsNm,
				temperatureK: 298,
				rivals: 'all',
				criterion: { kind: 'repulsive' }
			});
			expect(ranking).toHaveLength(1);
			one.separationsNm.forEach((_, at) => {
				const [row] = rows(plan, results, ranking, { at, from: 0, count: 1 });
				const sign = (row.pressurePa ?? 0) > 0 ? 'repulsive' : 'attractive';
				expect({ sign, undisputed: row.signCertainty === 1 }).not.toEqual({
					sign: one.sign === 'repulsive' ? 'attractive' : 'repulsive',
					undisputed: true
				});
			});
		}
	);

	it('repel without dispute where gold faces silica across bromobenzene at 50 nm', async () => {
		const { plan, results, ranking } = await screened({
			left: { versions: ['gold-drude@1.0', 'gold-johnson-christy@1.0'] },
			medium: { versions: await ALL_VERSIONS('bromobenzene') },
			right: { versions: await ALL_VERSIONS('silica') },
			separationsNm: [50],
			rivals: 'all',
			criterion: { kind: 'repulsive' }
		});
		const [row] = rows(plan, results, ranking, { at: 0, from: 0, count: 1 });
		expect(row).toMatchObject({ qualifies: true, signCertainty: 1 });
		expect(row.combinations).toBe(plan.left.length * plan.media.length * plan.right.length);
		expect(row.low).toBeLessThanOrEqual(row.figure ?? 0);
		expect(row.high).toBeGreaterThanOrEqual(row.figure ?? 0);
	});
});

describe('the ranked list', () => {
	it('puts first what qualifies, by its figure, and opens each row as the study that it is', async () => {
		const { plan, results, ranking } = await screened({
			left: { class: 'solid' },
			medium: { search: 'bromobenzene' },
			separationsNm: [20, 50, 100],
			rivals: 'all',
			rules: ['drude', 'plasma'],
			criterion: { kind: 'repulsive', fromNm: 50, toNm: 100 }
		});
		const all = rows(plan, results, ranking, { at: 1, from: 0, count: ranking.length });
		const qualifying = all.filter(({ qualifies }) => qualifies);
		expect(qualifying.length).toBeGreaterThan(5);
		expect(all.slice(0, qualifying.length)).toEqual(qualifying);
		const figures = qualifying.map(({ figure }) => figure ?? 0);
		expect(figures).toEqual([...figures].sort((a, b) => b - a));
		expect(qualifying.every(({ pressurePa }) => (pressurePa ?? 0) > 0)).toBe(true);

		const { study } = decodeStudy(new URLSearchParams(all[0].query));
		expect(study.atNm).toBe(50);
		const named = ['left', 'medium', 'right'].map(
			(slot) => materialIn(study, study.choices[0], slot)?.version
		);
		for (const version of named) expect(all[0].versions).toContain(version);

		// Why it repels: the medium lies between the two where it counts.
		const order = await permittivityOrder(plan, ranking[0].cell, 1);
		expect(order.between).toBeGreaterThan(0.5);
		expect(order.curves.map(({ place }) => place)).toEqual(['left', 'medium', 'right']);
	});

	it('agrees with the grid, which has every stated body against every medium', async () => {
		const { plan, results, ranking } = await screened({
			left: { class: 'polymer' },
			medium: { class: 'liquid', hazard: 'none' },
			right: { versions: ['gold-drude@1.0'] },
			separationsNm: [10, 100],
			criterion: { kind: 'leastAdhesion' }
		});
		const { bodies, media, cells } = grid(plan, results, ranking, { right: 0, at: 1, temperature: 0 });
		expect(bodies.length * media.length).toBe(ranking.length);
		const listed = rows(plan, results, ranking, { at: 1, from: 0, count: 500 });
		bodies.forEach((body, row) =>
			media.forEach((medium, column) => {
				const same = listed.find((one) => one.left === body.name && one.medium === medium.name);
				expect(cells[row][column].pressurePa).toBe(same?.pressurePa);
			})
		);
	});

	it('measures what a nanometre of a film does', async () => {
		const { ranking } = await screened({
			left: {
				versions: ['silica-two-oscillators@1.0'],
				coating: { of: 'gold-drude@1.0', thicknessNm: { from: 1, to: 100, count: 6 } }
			},
			medium: { versions: ['vacuum@1.0'] },
			right: { versions: ['gold-drude@1.0'] },
			separationsNm: [50],
			criterion: { kind: 'mostPerCoating' }
		});
		expect(ranking).toHaveLength(6);
		const figures = ranking.flatMap(({ figure }) => figure ?? []);
		// The thickest film has no thicker one to be compared with; the first nanometre counts most.
		expect(figures).toHaveLength(5);
		expect(figures).toEqual([...figures].sort((a, b) => b - a));
		expect(ranking[0].cell).toBe(0);
	});
});

describe('what leaves', () => {
	it('reads back to the same numbers, and says what it rests on', async () => {
		const { found, plan, results, ranking } = await screened({
			left: { versions: ['gold-drude@1.0', 'silica-two-oscillators@1.0'] },
			medium: { versions: ['bromobenzene-debye-uv@1.0'] },
			separationsNm: [20, 50],
			criterion: { kind: 'repulsive' }
		});
		const text = [...csv(found, results, ranking, 'http://localhost')].join('');
		const lines = text.split('\r\n').filter((line) => line !== '' && !line.startsWith('#'));
		expect(lines).toHaveLength(2 + ranking.length);
		const at = lines[0].split(',').indexOf('pressure_50nm');
		expect(lines[1].split(',')[at]).toBe('Pa');
		const document = JSON.parse([...json(found, results, ranking, 'http://localhost')].join('')) as {
			rows: { pressuresPa: number[] }[];
			provenance: string[];
		};
		document.rows.forEach(({ pressuresPa }, place) => {
			expect(Number(lines[2 + place].match(/("[^"]*"|[^,]*)(,|$)/g)?.[at]?.replace(/,$/, ''))).toBe(
				pressuresPa[1]
			);
		});
		for (const { ref, checksum } of plan.materials)
			expect(document.provenance.some((line) => line.includes(ref) && line.includes(checksum))).toBe(true);
	});

	it('tells what newer versions changed, sign changes first', async () => {
		const { curator, 'curator-2': reviewer } = people;
		const statement = {
			left: { search: 'titanium' },
			medium: { versions: ['vacuum@1.0'] },
			right: { versions: ['silica-two-oscillators@1.0'] },
			separationsNm: [50],
			criterion: { kind: 'leastAdhesion' }
		};
		const before = await screened(statement);
		const slug = before.plan.materials[before.plan.left[0].of].ref.split('@')[0];
		const id = await uploads.start(curator, {
			form: {
				dataset: slug,
				source: 'ordal-1985',
				model: '{"kind":"drude","plasmaEnergyEv":3,"dampingEv":0.1}'
			}
		});
		const draft = await uploads.makeDraft(curator, id);
		const { version } = await candidate(curator, draft.slug, draft.number);
		const answers = Object.fromEntries(
			version.checks.filter(({ severity }) => severity === 'warn').map(({ code }) => [code, 'Meant.'])
		);
		await submit(curator, slug, draft.number, { checksum: version.checksum, answers });
		await approve(reviewer, slug, draft.number, { checksum: version.checksum });

		const after = await screened(statement, before.found.screening.id);
		expect(after.found.row.basisId).toBe(before.found.screening.id);
		const told = differences(before, after);
		expect(told.compared).toBe(after.ranking.length);
		expect(told.signChanges).toBe(0);
		expect(told.largest.length).toBeGreaterThan(0);
		// The old one rests on what it named.
		expect(differences(before, before).largest).toEqual([]);
	});
});
