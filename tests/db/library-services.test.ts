import { describe, expect, it } from 'vitest';
import { libraryPage, libraryQuery, materialQuery } from '../../src/lib/schemas/material.ts';
import { materialDetail } from '../../src/lib/schemas/material-detail.ts';
import { resolvedVersion, spectrum as spectrumSchema, versionDetail } from '../../src/lib/schemas/version.ts';
import { InvalidInput, NotFound } from '../../src/lib/server/errors.ts';
import { tableCsv } from '../../src/lib/server/library/downloads.ts';
import * as materials from '../../src/lib/server/library/materials.ts';
import { rows } from '../../src/lib/server/library/search.ts';
import { spectrum } from '../../src/lib/server/library/spectrum.ts';
import { mapColumns } from '../../src/lib/server/library/upload/map-columns.ts';
import { parseSheet } from '../../src/lib/server/library/upload/parse.ts';
import * as versions from '../../src/lib/server/library/versions.ts';
import { useDatabase } from '../support/database.ts';
import { aDraft, move } from '../support/library.ts';

const db = useDatabase();

const search = (query: object) => rows(libraryQuery.parse({ limit: 200, ...query }));
const slugs = async (query: object) =>
	(await search(query)).rows.map(({ dataset, material }) => dataset?.slug ?? material.slug);

describe('the library table', () => {
	it('has a row for each dataset, in the shape that pages read', async () => {
		const page = await search({});
		expect(libraryPage.parse(page)).toEqual(page);
		const [{ datasets }] = await db.sql`select count(*)::int as datasets from dataset`;
		expect(page.rows).toHaveLength(datasets);
		expect(page.counts.versions).toBe(datasets);
		expect(page.next).toBeNull();
	});

	it.each(['material', 'class', 'dataset', 'static', 'source', 'quality', 'published'])(
		'pages by %s up and down without losing or repeating a row',
		async (sort) => {
			const whole = await slugs({ sort, withoutData: '1' });
			for (const direction of ['ascending', 'descending']) {
				const seen: string[] = [];
				let cursor: string | undefined;
				do {
					const page = await search({ sort, direction, withoutData: '1', limit: 7, cursor });
					seen.push(...page.rows.map(({ dataset, material }) => dataset?.slug ?? material.slug));
					cursor = page.next ?? undefined;
				} while (cursor);
				expect(seen).toEqual(direction === 'ascending' ? whole : [...whole].reverse());
			}
		}
	);

	it.each([
		['a name', 'gold', 'gold-drude'],
		['a formula', 'C6H5Br', 'bromobenzene-debye-uv'],
		['an author without the accent', 'rakic', 'aluminium-lorentz-drude'],
		['an alias', 'wolfram', 'tungsten-drude'],
		['a CAS number', '108-86-1', 'bromobenzene-debye-uv'],
		['a DOI', '10.1103/physrevb.6.4370', 'copper-johnson-christy'],
		['two words of different places', 'gold ordal', 'gold-drude']
	])('finds %s', async (_what, text, slug) => {
		expect(await slugs({ search: text })).toContain(slug);
	});

	it('puts the material that is meant first', async () => {
		const [first] = (await search({ search: 'au' })).rows;
		expect(first.material.slug).toBe('gold');
		expect((await search({ search: 'ethanol' })).rows[0].material.slug).toBe('ethanol');
	});

	it.each(['100%', '_', "';drop table version;--", '\\'])('takes "%s" as plain text', async (text) => {
		expect(await slugs({ search: text })).toEqual([]);
	});

	it('filters by class, quality and covered energy together', async () => {
		const page = await search({ class: 'metal', quality: 'checked', coversEv: 3 });
		expect(page.rows.length).toBeGreaterThan(5);
		for (const { material, dataset } of page.rows) {
			expect(material.class).toBe('metal');
			expect(dataset?.quality).toBe('checked');
			expect(dataset?.measuredRangeEv?.low).toBeLessThanOrEqual(3);
			expect(dataset?.measuredRangeEv?.high).toBeGreaterThanOrEqual(3);
		}
	});

	it('lists materials without data when asked, and counts them either way', async () => {
		const without = await slugs({ search: 'iodobenzene', withoutData: '1' });
		expect(without).toEqual(['iodobenzene']);
		const page = await search({ search: 'iodobenzene' });
		expect(page.rows).toEqual([]);
		expect(page.counts.materialsWithoutData).toBe(1);
	});

	it('refuses a cursor of another list', async () => {
		await expect(search({ cursor: 'nonsense' })).rejects.toBeInstanceOf(InvalidInput);
	});

	it('shows the newest published version and never a draft', async () => {
		await aDraft(db.sql, { dataset: 'chromium-lorentz-drude', major: 2, sources: ['rakic-1998'] });
		const versionShown = async () =>
			(await search({ search: 'chromium' })).rows.find(
				({ dataset }) => dataset?.slug === 'chromium-lorentz-drude'
			)?.dataset;
		expect((await versionShown())?.number).toBe('1.0');
		const next = await aDraft(db.sql, {
			dataset: 'chromium-lorentz-drude',
			major: 10,
			sources: ['rakic-1998']
		});
		await move(db.sql, next, 'in_review');
		await move(db.sql, next, 'published');
		expect(await versionShown()).toMatchObject({ number: '10.0', versionCount: 2 });
	});
});

describe('materials', () => {
	it('come in pages by name', async () => {
		const names: string[] = [];
		let cursor: string | undefined;
		do {
			const page = await materials.list(materialQuery.parse({ limit: 10, cursor }));
			names.push(...page.materials.map(({ name }) => name.toLowerCase()));
			cursor = page.next ?? undefined;
		} while (cursor);
		expect(names).toEqual([...names].sort());
		expect(new Set(names).size).toBe(89);
	});

	it('filter by class, quality and energy', async () => {
		const page = await materials.list(materialQuery.parse({ class: 'semiconductor', quality: 'checked' }));
		expect(page.materials.map(({ slug }) => slug)).toContain('silicon-carbide');
		expect(page.materials.map(({ slug }) => slug)).not.toContain('germanium');
	});

	it('carry their datasets, versions and sources', async () => {
		const gold = await materials.get('gold');
		expect(materialDetail.parse(gold)).toEqual(gold);
		expect(gold.datasets.length).toBe(gold.datasetCount);
		expect(gold.datasets.every(({ versions: [newest] }) => newest.sources.length > 0)).toBe(true);
	});

	it('are not found under another name', async () => {
		await expect(materials.get('unobtainium')).rejects.toBeInstanceOf(NotFound);
	});
});

describe('versions', () => {
	it('tell everything that is kept with them', async () => {
		const version = await versions.get('copper-johnson-christy', '1.0');
		expect(versionDetail.parse(version)).toEqual(version);
		expect(version.checks.map(({ code }) => code)).toContain('kramers-kronig-residual');
		expect(version.table).toMatchObject({ abscissaUnit: 'eV', quantities: ['n', 'k'], rowCount: 49 });
	});

	it.each([
		['gold-drude', '9.9'],
		['gold-drude', '1'],
		['gold-drude', '1.0 or 1=1'],
		['nothing', '1.0']
	])('are not found as %s %s', async (slug, number) => {
		await expect(versions.get(slug, number)).rejects.toBeInstanceOf(NotFound);
	});

	it('are hidden until they are published, and say what supersedes them', async () => {
		const parent = await versions.get('nickel-drude', '1.0');
		expect(parent.supersededBy).toBeNull();
		const id = await aDraft(db.sql, { dataset: 'nickel-drude', major: 2 });
		await db.sql`update version set parent_id = (select v.id from version as v join dataset on dataset.id = v.dataset_id
			where slug = 'nickel-drude' and major = 1) where id = ${id}`;
		await expect(versions.get('nickel-drude', '2.0')).rejects.toBeInstanceOf(NotFound);
		expect([...(await versions.resolve(['nickel-drude@2.0'])).keys()]).toEqual([]);
		await move(db.sql, id, 'in_review');
		await expect(versions.get('nickel-drude', '2.0')).rejects.toBeInstanceOf(NotFound);
		await move(db.sql, id, 'published');
		expect(await versions.get('nickel-drude', '1.0')).toMatchObject({
			supersededBy: '2.0',
			successors: ['2.0']
		});
		expect(await versions.get('nickel-drude', '2.0')).toMatchObject({ supersededBy: null, parent: '1.0' });
		expect(await versions.latestNumber('nickel-drude')).toBe('2.0');
	});

	it('keep their address when withdrawn, and supersede nothing then', async () => {
		const id = await aDraft(db.sql, { dataset: 'cobalt-drude', major: 2 });
		for (const state of ['in_review', 'published', 'withdrawn'] as const) await move(db.sql, id, state);
		expect(await versions.get('cobalt-drude', '2.0')).toMatchObject({
			state: 'withdrawn',
			withdrawn: { reason: 'a test' }
		});
		expect((await versions.get('cobalt-drude', '1.0')).supersededBy).toBeNull();
		expect(await versions.latestNumber('cobalt-drude')).toBe('1.0');
	});

	it('resolve many refs at once and leave out what names nothing', async () => {
		const found = await versions.resolve([
			'gold-drude@1.0',
			'water-parsegian@1.0',
			'gold-drude@7.0',
			'gold-drude',
			''
		]);
		expect([...found.keys()].sort()).toEqual(['gold-drude@1.0', 'water-parsegian@1.0']);
		for (const version of found.values()) expect(resolvedVersion.parse(version)).toEqual(version);
	});
});

describe('files that leave the library', () => {
	it.each(['gold-johnson-christy', 'silicon-table', 'gold-johnson-christy-x-ray'])(
		'read back to the same model: %s',
		async (slug) => {
			const version = await versions.get(slug, '1.0');
			if (version.model.kind !== 'table' || !version.table) throw new Error('not a table');
			const text = await tableCsv(version, 'http://localhost');
			const ordinates = version.table.quantities.map((quantity, index) => ({ column: index + 2, quantity }));
			const { lowEnd, highEnd } = version.model;
			const reading = {
				abscissa: { column: 1, unit: version.table.abscissaUnit },
				ordinates,
				duplicates: 'refuse',
				lowEnd,
				highEnd
			};
			const again = mapColumns(parseSheet(text), reading as Parameters<typeof mapColumns>[1]);
			expect(again.model).toEqual(version.model);
		}
	);

	it('have no rows for a closed form, and say where its model is', async () => {
		await expect(tableCsv(await versions.get('gold-drude', '1.0'))).rejects.toThrow(/model\.json/);
		await expect(versions.rawFile('gold-drude', '1.0')).rejects.toThrow(/model\.json/);
	});
});

describe('spectra', () => {
	it('are sampled for every published version', async () => {
		for (const { dataset } of (await search({})).rows) {
			const sampled = await spectrum(dataset?.ref ?? '');
			expect(spectrumSchema.parse(sampled), dataset?.ref).toEqual(sampled);
			const { xiRadPerS, epsilon } = sampled.imaginary;
			expect(epsilon).toHaveLength(xiRadPerS.length);
			expect(
				epsilon.every((value, index) => value >= 1 && (index === 0 || value <= epsilon[index - 1]))
			).toBe(true);
			expect(sampled.real?.n.every((n) => n >= 0)).toBe(true);
		}
	});

	it('split eps - 1 of a table into parts that add up to one', async () => {
		const { shares } = (await spectrum('gold-johnson-christy@1.0')).imaginary;
		shares?.inside.forEach((inside, index) => {
			expect(inside + shares.below[index] + shares.above[index]).toBeCloseTo(1, 12);
		});
		expect(shares?.inside.length).toBeGreaterThan(100);
	});
});
