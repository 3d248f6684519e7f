import { eq, sql } from 'drizzle-orm';
import type { DatasetFields } from '../../schemas/dataset.ts';
import type { MaterialFields } from '../../schemas/material.ts';
import type { SourceFields } from '../../schemas/source.ts';
import { appendAudit } from '../audit/append.ts';
import type { Transaction } from '../db/client.ts';
import { dataset } from '../db/schema/dataset.ts';
import { material } from '../db/schema/material.ts';
import { source } from '../db/schema/source.ts';
import { Conflict, NotFound } from '../errors.ts';
import { folded } from './search-text.ts';

/** Writing what surrounds the versions: materials, sources, datasets. Each writes its audit row beside it. */

const searchable = (...words: (string | null)[]): string =>
	folded(words.filter((word) => word !== null).join(' '));

const materialRow = (fields: MaterialFields) => ({
	...fields,
	searchText: searchable(fields.name, fields.formula, fields.casNumber, ...fields.aliases)
});

const sourceRow = (fields: SourceFields) => ({
	...fields,
	searchText: searchable(fields.title, fields.container, fields.doi, String(fields.year), ...fields.authors)
});

/**
 * Makes what must not be there yet: somebody who thinks of another thing under the same slug is told, not obeyed.
 *
 * @throws Conflict where the slug is taken
 */
export async function createMaterial(tx: Transaction, fields: MaterialFields, actor: string): Promise<void> {
	await requireFree(tx, 'material', fields.slug);
	await keepMaterial(tx, fields, actor);
}

export async function createSource(tx: Transaction, fields: SourceFields, actor: string): Promise<void> {
	await requireFree(tx, 'source', fields.slug);
	await keepSource(tx, fields, actor);
}

export async function createDataset(tx: Transaction, fields: DatasetFields, actor: string): Promise<void> {
	await requireFree(tx, 'dataset', fields.slug);
	await keepDataset(tx, fields, actor);
}

const TABLES = { material, source, dataset };

async function requireFree(tx: Transaction, what: keyof typeof TABLES, slug: string): Promise<void> {
	// Two at once: the second waits here and then finds the first.
	await tx.execute(sql`select pg_advisory_xact_lock(hashtext(${`${what}/${slug}`}))`);
	const table = TABLES[what];
	const [found] = await tx.select({ id: table.id }).from(table).where(eq(table.slug, slug));
	if (found) throw new Conflict(`There is a ${what} "${slug}" already. Use it, or choose another slug.`);
}

/** Makes a material, or brings the one of this slug to these fields. */
export async function keepMaterial(tx: Transaction, fields: MaterialFields, actor: string): Promise<string> {
	const row = materialRow(fields);
	const [found] = await tx.select({ id: material.id }).from(material).where(eq(material.slug, fields.slug));
	const [{ id }] = found
		? await tx.update(material).set(row).where(eq(material.id, found.id)).returning({ id: material.id })
		: await tx.insert(material).values(row).returning({ id: material.id });
	await appendAudit(tx, {
		actor,
		action: found ? 'material.update' : 'material.create',
		objectType: 'material',
		objectId: id,
		details: { slug: fields.slug }
	});
	return id;
}

/** Makes a source, or brings the one of this slug to these fields. */
export async function keepSource(tx: Transaction, fields: SourceFields, actor: string): Promise<string> {
	const row = sourceRow(fields);
	const [found] = await tx.select({ id: source.id }).from(source).where(eq(source.slug, fields.slug));
	const [{ id }] = found
		? await tx.update(source).set(row).where(eq(source.id, found.id)).returning({ id: source.id })
		: await tx.insert(source).values(row).returning({ id: source.id });
	await appendAudit(tx, {
		actor,
		action: found ? 'source.update' : 'source.create',
		objectType: 'source',
		objectId: id,
		details: { slug: fields.slug }
	});
	return id;
}

/** Makes a dataset, or gives the one of this slug its title. A dataset stays with its material. */
export async function keepDataset(tx: Transaction, fields: DatasetFields, actor: string): Promise<string> {
	const [owner] = await tx
		.select({ id: material.id })
		.from(material)
		.where(eq(material.slug, fields.material));
	if (!owner) throw new NotFound(`There is no material "${fields.material}". Make it first.`);
	const [found] = await tx.select().from(dataset).where(eq(dataset.slug, fields.slug));
	if (found && found.materialId !== owner.id)
		throw new Conflict(`The dataset "${fields.slug}" belongs to another material. Choose another name.`);
	if (found?.title === fields.title) return found.id;
	const values = { slug: fields.slug, title: fields.title, materialId: owner.id };
	const [{ id }] = found
		? await tx
				.update(dataset)
				.set({ title: fields.title })
				.where(eq(dataset.id, found.id))
				.returning({ id: dataset.id })
		: await tx.insert(dataset).values(values).returning({ id: dataset.id });
	await appendAudit(tx, {
		actor,
		action: found ? 'dataset.update' : 'dataset.create',
		objectType: 'dataset',
		objectId: id,
		details: { slug: fields.slug, title: fields.title }
	});
	return id;
}
