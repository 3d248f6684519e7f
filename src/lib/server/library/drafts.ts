import { and, eq, inArray, max, ne, type SQL } from 'drizzle-orm';
import { runChecks } from '../../engine/checks/all-checks.ts';
import type { CheckOutcome, CheckSubject } from '../../engine/checks/check.ts';
import { staticPermittivity } from '../../engine/checks/static-permittivity.ts';
import type { PermittivityModel } from '../../engine/contract.ts';
import { Refusal } from '../../engine/refusal.ts';
import { datasetSlug } from '../../schemas/dataset.ts';
import type { ModelDescription, TableDescription } from '../../schemas/upload.ts';
import { appendAudit } from '../audit/append.ts';
import type { Transaction } from '../db/client.ts';
import { checkResult, dataset, version, versionSource } from '../db/schema/dataset.ts';
import { material } from '../db/schema/material.ts';
import { source } from '../db/schema/source.ts';
import { InvalidInput, NotFound } from '../errors.ts';
import { canonicalJson, sha256 } from './canonical.ts';
import { fingerprint } from './fingerprint.ts';
import { decode } from './upload/decode.ts';
import { mapColumns, type MappedTable } from './upload/map-columns.ts';
import { parseSheet } from './upload/parse.ts';
import { PUBLIC_STATES } from './viewer.ts';

const OTHERS_MAX = 60;

/** Making a draft, from a file or from a closed form: read, checked and sourced before anything is stored. */

export interface Draft {
	id: string;
	number: string;
	checksum: string;
	checks: CheckOutcome[];
}

export interface RawFile {
	name: string;
	bytes: Buffer;
}

interface Content {
	model: PermittivityModel;
	table: MappedTable | null;
	raw: RawFile | null;
	description: ModelDescription;
}

/** Where a draft goes. A number is given by the seed only; others follow from what has changed. */
export interface Place {
	datasetSlug: string;
	number?: { major: number; minor: number };
	actor: string;
	/** Code of a warning to the reason why it stands. */
	answers?: Record<string, string>;
	/** The draft whose content this takes the place of. */
	replaces?: string;
}

/** @throws RefusedFile for a file that is not taken, with the lines; InvalidInput for a description that does not fit */
export async function draftFromTable(
	tx: Transaction,
	place: Place,
	raw: RawFile,
	description: TableDescription
): Promise<Draft> {
	const sheet = parseSheet(decode(raw.bytes), description);
	const table = mapColumns(sheet, description);
	return store(tx, place, { model: table.model, table, raw, description });
}

export function draftFromModel(
	tx: Transaction,
	place: Place,
	model: PermittivityModel,
	description: ModelDescription
): Promise<Draft> {
	return store(tx, place, { model, table: null, raw: null, description });
}

async function store(tx: Transaction, place: Place, content: Content): Promise<Draft> {
	const { model, table, description } = content;
	const home = await findDataset(tx, place.datasetSlug);
	const sourceIds = await findSources(tx, description.source);
	const parent = description.parent ? await findParent(tx, home.id, description.parent) : null;

	const checks = checkModel({
		model,
		rows: table?.rows ?? null,
		material: home.material,
		// The seed comes in an order of its own, and each of its versions was held against the literature.
		...(place.number ? {} : { others: await publishedOf(tx, home.material.id, place.replaces) })
	});
	const row = contentRow(content);
	const number = place.number ?? (await nextNumber(tx, home.id, parent, row, place.replaces));
	const id = place.replaces
		? await rewrite(tx, place.replaces, { ...row, ...number, parentId: parent?.id ?? null })
		: await insert(tx, {
				...row,
				...number,
				datasetId: home.id,
				parentId: parent?.id ?? null,
				createdBy: place.actor
			});

	await tx
		.insert(versionSource)
		.values(sourceIds.map((sourceId, position) => ({ versionId: id, sourceId, position })));
	await tx.insert(checkResult).values(
		checks.map((check, position) => ({
			versionId: id,
			position,
			...check,
			answer: (check.severity === 'warn' && place.answers?.[check.code]) || null
		}))
	);
	await appendAudit(tx, {
		actor: place.actor,
		action: place.replaces ? 'version.rewrite' : 'version.create',
		objectType: 'version',
		objectId: id,
		toState: 'draft',
		details: {
			dataset: place.datasetSlug,
			number: `${number.major}.${number.minor}`,
			checksum: row.checksum
		}
	});
	return { id, number: `${number.major}.${number.minor}`, checksum: row.checksum, checks };
}

/** What is told where nobody has compared the figures yet. */
const NOT_COMPARED = 'The figures have not been compared with their source by a second person.';

function contentRow({ model, table, raw, description }: Content) {
	const atRest = staticPermittivity(model);
	const measured = table?.measuredRangeEv ?? description.measuredRangeEv;
	const isProvisional = description.quality === 'provisional';
	return {
		quality: description.quality,
		qualityReason: description.qualityReason ?? (isProvisional ? NOT_COMPARED : null),
		kind: table ? ('table' as const) : ('model' as const),
		model,
		checksum: sha256(canonicalJson(model)),
		fingerprint: fingerprint(model, table?.rows?.epsilon1 ?? null),
		conducts: atRest === null,
		staticPermittivity: atRest,
		measuredLowEv: measured?.low ?? null,
		measuredHighEv: measured?.high ?? null,
		validLowEv: description.validRangeEv?.low ?? null,
		validHighEv: description.validRangeEv?.high ?? null,
		temperatureK: description.sample?.temperatureK ?? null,
		sample: description.sample,
		note: description.note,
		givenColumns: table && {
			abscissaUnit: table.given.abscissaUnit,
			quantities: table.given.quantities,
			...('joined' in description && typeof description.joined === 'string'
				? { joined: description.joined }
				: {})
		},
		givenAbscissa: table?.given.abscissa ?? null,
		givenFirst: table?.given.ordinates[0] ?? null,
		givenSecond: table?.given.ordinates[1] ?? null,
		givenUncertainties: table && table.uncertainties.length > 0 ? table.uncertainties : null,
		epsilon1: table?.rows?.epsilon1 ?? null,
		raw: raw?.bytes ?? null,
		rawName: raw?.name ?? null,
		rawSha256: raw ? sha256(raw.bytes) : null
	};
}

type ContentRow = ReturnType<typeof contentRow>;
type Written = ContentRow & { major: number; minor: number; parentId: string | null };

async function insert(
	tx: Transaction,
	row: Written & { datasetId: string; createdBy: string }
): Promise<string> {
	const [{ id }] = await tx.insert(version).values(row).returning({ id: version.id });
	return id;
}

/** Only a draft: the database refuses to change anything that has left that state. */
async function rewrite(tx: Transaction, id: string, row: Written): Promise<string> {
	await tx.delete(versionSource).where(eq(versionSource.versionId, id));
	await tx.delete(checkResult).where(eq(checkResult.versionId, id));
	await tx.update(version).set(row).where(eq(version.id, id));
	return id;
}

/** What the library has of a material already, that a new version of it is held against. */
async function publishedOf(tx: Transaction, materialId: string, but: string | undefined) {
	const rows = await tx
		.select({ slug: dataset.slug, major: version.major, minor: version.minor, model: version.model })
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.where(
			and(
				eq(dataset.materialId, materialId),
				eq(version.state, 'published'),
				but === undefined ? undefined : ne(version.id, but)
			)
		)
		.orderBy(dataset.slug, version.major, version.minor)
		.limit(OTHERS_MAX);
	return rows.map(({ slug, major, minor, model }) => ({ ref: `${slug}@${major}.${minor}`, model }));
}

/** What the engine would refuse to compute is refused here already, in the caller's terms. */
function checkModel(subject: CheckSubject): CheckOutcome[] {
	try {
		return runChecks(subject).map(finite);
	} catch (error) {
		if (!(error instanceof Refusal)) throw error;
		throw new InvalidInput('The engine cannot compute with this model.', error.issues);
	}
}

/** A figure that ran out of the range of numbers is not one: its sentence says what happened. */
function finite(check: CheckOutcome): CheckOutcome {
	const figure = check.figure !== null && Number.isFinite(check.figure) ? check.figure : null;
	return { ...check, figure };
}

/** Locked until the draft is there, so that two at once do not take the same number. */
async function findDataset(tx: Transaction, slug: string) {
	const parsed = datasetSlug.safeParse(slug);
	const [found] = parsed.success
		? await tx
				.select({ id: dataset.id, material })
				.from(dataset)
				.innerJoin(material, eq(dataset.materialId, material.id))
				.where(eq(dataset.slug, slug))
				.for('update', { of: dataset })
		: [];
	if (!found) throw new NotFound(`There is no dataset "${slug}". Make it first.`);
	return found;
}

async function findSources(tx: Transaction, slugs: string | string[]): Promise<string[]> {
	const wanted = [slugs].flat();
	const found = await tx
		.select({ id: source.id, slug: source.slug })
		.from(source)
		.where(inArray(source.slug, wanted));
	const ids = new Map(found.map(({ id, slug }) => [slug, id]));
	const missing = wanted.filter((slug) => !ids.has(slug));
	if (missing.length > 0) {
		throw new InvalidInput('A source is not in the library.', [
			{ path: 'description.source', message: `there is no source "${missing.join('", "')}"; add it first` }
		]);
	}
	return wanted.map((slug) => ids.get(slug) ?? '');
}

interface Parent {
	id: string;
	major: number;
	kind: string;
	checksum: string;
	givenAbscissa: number[] | null;
	givenFirst: number[] | null;
	givenSecond: number[] | null;
	givenUncertainties: unknown;
}

/** A new version may start from any that was published, also one that was withdrawn since. */
async function findParent(tx: Transaction, datasetId: string, number: string): Promise<Parent> {
	const [major, minor] = number.split('.').map(Number);
	const [found] = await tx
		.select({
			id: version.id,
			major: version.major,
			kind: version.kind,
			checksum: version.checksum,
			givenAbscissa: version.givenAbscissa,
			givenFirst: version.givenFirst,
			givenSecond: version.givenSecond,
			givenUncertainties: version.givenUncertainties
		})
		.from(version)
		.where(
			and(
				eq(version.datasetId, datasetId),
				eq(version.major, major),
				eq(version.minor, minor),
				inArray(version.state, PUBLIC_STATES)
			)
		);
	if (found) return found;
	throw new InvalidInput('The parent is not a version of this dataset.', [
		{ path: 'description.parent', message: `there is no published version ${number} of it` }
	]);
}

/** The same numbers under another description are a minor step; any other number is a major one. */
function isSame(row: ContentRow, parent: Parent): boolean {
	const numbers = ({ kind, checksum, givenAbscissa, givenFirst, givenSecond, givenUncertainties }: Numbers) =>
		canonicalJson([kind, checksum, givenAbscissa, givenFirst, givenSecond, givenUncertainties]);
	return numbers(row) === numbers(parent);
}

type Numbers = Omit<Parent, 'id' | 'major'>;

async function nextNumber(
	tx: Transaction,
	datasetId: string,
	parent: Parent | null,
	row: ContentRow,
	replaced: string | undefined
): Promise<{ major: number; minor: number }> {
	const others = and(
		eq(version.datasetId, datasetId),
		replaced === undefined ? undefined : ne(version.id, replaced)
	);
	const highest = async (column: typeof version.major | typeof version.minor, where: SQL | undefined) => {
		const [{ top }] = await tx
			.select({ top: max(column) })
			.from(version)
			.where(where);
		return top ?? 0;
	};
	if (!parent || !isSame(row, parent)) return { major: (await highest(version.major, others)) + 1, minor: 0 };
	const { major } = parent;
	return { major, minor: (await highest(version.minor, and(others, eq(version.major, major)))) + 1 };
}
