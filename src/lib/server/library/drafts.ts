import { eq, inArray, sql } from 'drizzle-orm';
import { runChecks } from '../../engine/checks/all-checks.ts';
import type { CheckOutcome, CheckSubject } from '../../engine/checks/check.ts';
import { staticPermittivity } from '../../engine/checks/static-permittivity.ts';
import type { PermittivityModel } from '../../engine/contract.ts';
import { Refusal } from '../../engine/refusal.ts';
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

interface Place {
	datasetSlug: string;
	/** Left out: the next major number of the dataset. */
	number?: { major: number; minor: number };
	actor: string;
	/** Code of a warning to the reason why it stands. */
	answers?: Record<string, string>;
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
	const { model, table, raw, description } = content;
	const home = await findDataset(tx, place.datasetSlug);
	const sourceIds = await findSources(tx, description.source);
	const parentId = description.parent ? await findVersion(tx, home.id, description.parent) : null;
	const number = place.number ?? (await nextMajor(tx, home.id));

	const checks = checkModel({ model, rows: table?.rows ?? null, material: home.material });
	const atRest = staticPermittivity(model);
	const measured = table?.measuredRangeEv ?? description.measuredRangeEv;
	const checksum = sha256(canonicalJson(model));
	const [{ id }] = await tx
		.insert(version)
		.values({
			datasetId: home.id,
			...number,
			quality: description.quality,
			qualityReason: description.qualityReason,
			kind: table ? 'table' : 'model',
			model,
			checksum,
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
			parentId,
			givenColumns: table && { abscissaUnit: table.given.abscissaUnit, quantities: table.given.quantities },
			givenAbscissa: table?.given.abscissa ?? null,
			givenFirst: table?.given.ordinates[0] ?? null,
			givenSecond: table?.given.ordinates[1] ?? null,
			epsilon1: table?.rows?.epsilon1 ?? null,
			raw: raw?.bytes ?? null,
			rawName: raw?.name ?? null,
			rawSha256: raw ? sha256(raw.bytes) : null,
			createdBy: place.actor
		})
		.returning({ id: version.id });

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
		action: 'version.create',
		objectType: 'version',
		objectId: id,
		toState: 'draft',
		details: { dataset: place.datasetSlug, number: `${number.major}.${number.minor}`, checksum }
	});
	return { id, number: `${number.major}.${number.minor}`, checksum, checks };
}

/** What the engine would refuse to compute is refused here already, in the caller's terms. */
function checkModel(subject: CheckSubject): CheckOutcome[] {
	try {
		return runChecks(subject);
	} catch (error) {
		if (!(error instanceof Refusal)) throw error;
		throw new InvalidInput('The engine cannot compute with this model.', error.issues);
	}
}

async function findDataset(tx: Transaction, slug: string) {
	const [found] = await tx
		.select({ id: dataset.id, material })
		.from(dataset)
		.innerJoin(material, eq(dataset.materialId, material.id))
		.where(eq(dataset.slug, slug));
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

async function findVersion(tx: Transaction, datasetId: string, number: string): Promise<string> {
	const [major, minor] = number.split('.').map(Number);
	const [found] = await tx
		.select({ id: version.id })
		.from(version)
		.where(
			sql`${version.datasetId} = ${datasetId} and ${version.major} = ${major} and ${version.minor} = ${minor}`
		);
	if (found) return found.id;
	throw new InvalidInput('The parent is not a version of this dataset.', [
		{ path: 'description.parent', message: `there is no version ${number} of it` }
	]);
}

async function nextMajor(tx: Transaction, datasetId: string): Promise<{ major: number; minor: number }> {
	const [{ highest }] = await tx
		.select({ highest: sql<number | null>`max(${version.major})` })
		.from(version)
		.where(eq(version.datasetId, datasetId));
	return { major: (highest ?? 0) + 1, minor: 0 };
}
