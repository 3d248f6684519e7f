import { readFile } from 'node:fs/promises';
import { describe, expect, it } from 'vitest';
import { auditChainBreak } from '../../src/lib/server/audit/append.ts';
import { seedLibrary } from '../../src/lib/server/library/seed.ts';
import { readSeedFiles } from '../../src/lib/server/library/seed-files.ts';
import { permittivityOnImaginaryAxis } from '../../src/lib/engine/index.ts';
import * as versions from '../../src/lib/server/library/versions.ts';
import { useDatabase } from '../support/database.ts';

const db = useDatabase();

describe('the seed', () => {
	it('is all published by the installation, with every step in the audit trail', async () => {
		const files = await readSeedFiles('data-seed');
		const [counts] = await db.sql`
			select count(*)::int as versions, count(*) filter (where state = 'published' and published_by = 'installation')::int
				as published from version`;
		expect(counts).toEqual({ versions: files.versions.length, published: files.versions.length });
		const [{ unaudited }] = await db.sql`
			select count(*)::int as unaudited from version
			where (select count(*) from audit_entry where object_id = version.id::text) <> 3`;
		expect(unaudited).toBe(0);
		expect(await auditChainBreak(db.database)).toBeNull();
	});

	it('changes nothing when it is loaded again', async () => {
		const [before] = await db.sql`select count(*)::int as entries, max(hash) as hash from audit_entry`;
		const report = await seedLibrary(db.database, 'data-seed');
		expect(report.written).toBe(0);
		const [after] = await db.sql`select count(*)::int as entries, max(hash) as hash from audit_entry`;
		expect(after).toEqual(before);
	});

	it('has for each class what the reference holds', async () => {
		const classes = await db.sql`
			select class, count(distinct material.id)::int as materials, count(dataset.id)::int as datasets
			from material join dataset on material_id = material.id group by class order by class`;
		const of = (name: string) => classes.find((row) => row.class === name);
		expect(of('metal')).toMatchObject({ materials: 16 });
		expect(of('liquid')).toMatchObject({ materials: 19, datasets: 23 });
		const [{ solids }] = await db.sql`
			select count(distinct material_id)::int as solids from dataset join version on dataset_id = dataset.id
			join version_source on version_id = version.id join source on source.id = source_id
			where source.slug in ('dispersion-plot', 'hough-white-1980', 'bergstrom-1997', 'parsegian-2006', 'drummond-chan-1997')
			and material_id in (select id from material where class in ('insulator', 'polymer') or slug in ('silicon-carbide-cubic', 'zinc-sulphide', 'zinc-selenide'))`;
		expect(solids).toBe(30);
		const [{ lorentzDrude, drude }] = await db.sql`
			select count(*) filter (where slug like '%-lorentz-drude')::int as "lorentzDrude",
				count(*) filter (where slug ~ '^[a-z]+-drude$')::int as drude from dataset`;
		expect({ lorentzDrude, drude }).toEqual({ lorentzDrude: 11, drude: 14 });
	});

	it('gives every provisional version a reason and every warning an answer', async () => {
		const [{ unexplained }] = await db.sql`
			select count(*)::int as unexplained from version where quality = 'provisional' and quality_reason is null`;
		const [{ unanswered }] = await db.sql`
			select count(*)::int as unanswered from check_result where severity = 'warn' and answer is null`;
		expect({ unexplained, unanswered }).toEqual({ unexplained: 0, unanswered: 0 });
	});

	it('shows no hazardous liquid without its caution', async () => {
		const rows = await db.sql`select slug, hazards from material where class = 'liquid' and slug <> 'water'`;
		for (const { slug, hazards } of rows) {
			expect(hazards.caution, slug).toContain("supplier's safety data sheet");
			for (const { code, text } of hazards.statements)
				expect(`${code} ${text}`).toMatch(/^(H\d{3}[a-zA-Z]*|EUH\d{3}) \S/);
		}
	});

	// eps(i xi) at 1e13 .. 1e17 rad/s: figures computed from the same published parameters by another program (double
	// precision, six digits kept), so 1e-5 is what they can tell; germanium's oscillator energy itself is printed to five
	// digits, which leaves twice 5e-5/4.0284 there.
	it.each([
		['gold-lorentz-drude@1.0', [158037, 7941.32, 141.508, 4.72532, 1.10388]],
		['tungsten-lorentz-drude@1.0', [77530.1, 4248.44, 103.339, 7.40522, 1.1389]],
		['titanium-lorentz-drude@1.0', [13578.3, 882.137, 41.9246, 2.48987, 1.01936]],
		['gold-plasma@1.0', [1869620, 18697.2, 187.962, 2.86962, 1.0187]],
		['silicon-penn@1.0', [11.67, 11.6682, 11.4939, 4.98375, 1.0632]],
		['silicon-carbide-phonon@1.0', [9.98799, 8.97494, 6.7457, 4.89324, 1.12017]],
		['gallium-arsenide-phonon@1.0', [12.9877, 11.4169, 10.831, 4.60602, 1.05608]],
		['germanium-penn@1.0', [16, 15.996, 15.61, 5.08757, 1.05598], 2.5e-5],
		['gold-drude-9-ev@1.0', [295947, 12206.8, 178.522, 2.85973, 1.01869]]
	])('holds %s as its figures say', async (ref, expected, tolerance = 1e-5) => {
		const model = (await versions.resolve([ref])).get(ref)?.model;
		const at = permittivityOnImaginaryAxis(model ?? { kind: 'vacuum' });
		[1e13, 1e14, 1e15, 1e16, 1e17].forEach((xi, index) => {
			expect(Math.abs(at(xi) / expected[index] - 1), `${ref} at ${xi}`).toBeLessThan(tolerance);
		});
	});

	it('keeps the file of a table byte for byte', async () => {
		const { bytes, sha256 } = await versions.rawFile('silver-johnson-christy', '1.0');
		expect(bytes.equals(await readFile('data-seed/silver/silver-johnson-christy.csv'))).toBe(true);
		expect(sha256).toMatch(/^sha256:/);
	});
});
