import { and, desc, eq, sql } from 'drizzle-orm';
import type { PermittivityModel } from '../../engine/contract.ts';
import type { SignedIn } from '../../schemas/person.ts';
import { modelDescriptionOf, tableDescriptionOf, type UploadForm } from '../../schemas/upload-form.ts';
import type { UploadPreview } from '../../schemas/upload-preview.ts';
import { modelDescription, tableDescription } from '../../schemas/upload.ts';
import { parseInput } from '../api/issues.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database, type Transaction } from '../db/client.ts';
import { upload } from '../db/schema/curation.ts';
import { dataset, version } from '../db/schema/dataset.ts';
import { Conflict, InvalidInput, NotFound, StateError } from '../errors.ts';
import { draftFromModel, draftFromTable, type Place, type RawFile } from './drafts.ts';
import { decode } from './upload/decode.ts';
import { readModelJson } from './upload/model-json.ts';
import { previewOf, previewOfModel, withGuess } from './upload/preview.ts';
import * as versions from './versions.ts';

/** A curator's desk: files and closed forms on their way to becoming drafts. Each is seen and changed by its owner only. */

export interface UploadSummary {
	id: string;
	/** Name of the file; null for a closed form. */
	fileName: string | null;
	dataset: string | null;
	savedAt: string;
	/** The draft that was made of it. */
	ref: string | null;
}

export interface UploadDetail extends UploadSummary {
	form: UploadForm;
	revision: number;
	bytes: number | null;
	/** State of the draft that was made of it. */
	state: string | null;
	preview: UploadPreview;
}

const FIELDS_MAX = 400;
const TEXT_MAX = 400_000;
const UPLOADS_MAX = 200;

const VERSION_REF = sql<string | null>`(select d.slug || '@' || v.major || '.' || v.minor from ${version} as v
	join ${dataset} as d on d.id = v.dataset_id where v.id = ${upload.versionId})`;
const VERSION_STATE = sql<
	string | null
>`(select v.state from ${version} as v where v.id = ${upload.versionId})`;

/** Newest first. */
export async function list(actor: SignedIn): Promise<UploadSummary[]> {
	const rows = await database()
		.select({
			id: upload.id,
			fileName: upload.rawName,
			form: upload.form,
			savedAt: upload.savedAt,
			ref: VERSION_REF
		})
		.from(upload)
		.where(eq(upload.personId, actor.id))
		.orderBy(desc(upload.savedAt))
		.limit(UPLOADS_MAX);
	return rows.map(({ form, savedAt, ...row }) => ({
		...row,
		dataset: form.dataset || null,
		savedAt: savedAt.toISOString()
	}));
}

/** @throws RefusedFile for what is no text file: nothing of it is kept */
export async function start(
	actor: SignedIn,
	content: { raw: RawFile } | { form: UploadForm },
	form: UploadForm = {}
): Promise<string> {
	const raw = 'raw' in content ? content.raw : null;
	if (raw) decode(raw.bytes);
	return database().transaction(async (tx) => {
		const at = now();
		const [{ id }] = await tx
			.insert(upload)
			.values({
				personId: actor.id,
				raw: raw?.bytes ?? null,
				rawName: raw?.name ?? null,
				form: 'form' in content ? content.form : form,
				createdAt: at,
				savedAt: at
			})
			.returning({ id: upload.id });
		await appendAudit(tx, { actor: actor.id, action: 'upload.start', objectType: 'upload', objectId: id });
		return id;
	});
}

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;

const own = (actor: SignedIn, id: string) => and(eq(upload.id, id), eq(upload.personId, actor.id));

async function find(executor: Pick<Transaction, 'select'>, actor: SignedIn, id: string) {
	const [row] = UUID.test(id)
		? await executor
				.select({ row: upload, ref: VERSION_REF, state: VERSION_STATE })
				.from(upload)
				.where(own(actor, id))
		: [];
	if (!row) throw new NotFound('There is no such upload of yours. It may have become a published version.');
	return row;
}

export async function get(actor: SignedIn, id: string): Promise<UploadDetail> {
	const { row, ref, state } = await find(database(), actor, id);
	const preview = row.raw ? previewOf(row.raw, row.form) : previewOfModel(row.form);
	return {
		id: row.id,
		fileName: row.rawName,
		dataset: row.form.dataset || null,
		savedAt: row.savedAt.toISOString(),
		ref,
		form: preview.guess ? withGuess(row.form, preview.guess) : row.form,
		revision: row.revision,
		bytes: row.raw?.length ?? null,
		state,
		preview
	};
}

/** The upload that a draft was made of, if it is still there. */
export async function ofVersion(actor: SignedIn, ref: string): Promise<string | null> {
	const parts = versions.partsOf(ref);
	if (!parts) return null;
	const [row] = await database()
		.select({ id: upload.id })
		.from(upload)
		.innerJoin(version, eq(upload.versionId, version.id))
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.where(
			and(
				eq(upload.personId, actor.id),
				eq(dataset.slug, parts.slug),
				eq(version.major, parts.major),
				eq(version.minor, parts.minor)
			)
		);
	return row?.id ?? null;
}

/**
 * Keeps the form as typed, whatever it says.
 *
 * @throws Conflict where it was saved from elsewhere since: what was typed there is not overwritten
 */
export async function save(
	actor: SignedIn,
	id: string,
	revision: number,
	form: UploadForm
): Promise<{ revision: number; savedAt: string }> {
	const length = Object.entries(form).reduce((sum, [name, text]) => sum + name.length + text.length, 0);
	if (Object.keys(form).length > FIELDS_MAX || length > TEXT_MAX)
		throw new InvalidInput('The form is longer than any form of this page.', [
			{ path: 'form', message: `at most ${FIELDS_MAX} fields and ${TEXT_MAX} characters` }
		]);
	return database().transaction(async (tx) => {
		const { row } = await find(tx, actor, id);
		if (row.revision !== revision) throw savedElsewhere(row.savedAt);
		const savedAt = now();
		const [saved] = await tx
			.update(upload)
			.set({ form, revision: revision + 1, savedAt })
			.where(and(own(actor, id), eq(upload.revision, revision)))
			.returning({ revision: upload.revision });
		if (!saved) throw savedElsewhere(savedAt);
		return { revision: saved.revision, savedAt: savedAt.toISOString() };
	});
}

const savedElsewhere = (at: Date) =>
	new Conflict(
		`This upload was saved in another window at ${at.toISOString().slice(11, 19)} UTC. Load the page again to go on from there.`
	);

export async function remove(actor: SignedIn, id: string): Promise<void> {
	await database().transaction(async (tx) => {
		await find(tx, actor, id);
		await tx.delete(upload).where(own(actor, id));
		await appendAudit(tx, { actor: actor.id, action: 'upload.remove', objectType: 'upload', objectId: id });
	});
}

/**
 * Makes the draft, or makes it anew where it is still one.
 *
 * @throws InvalidInput, RefusedFile with what is wrong; then the upload stays as it is
 */
export async function makeDraft(
	actor: SignedIn,
	id: string
): Promise<{ slug: string; number: string; failed: boolean }> {
	return database().transaction(async (tx) => {
		const { row, ref, state } = await find(tx, actor, id);
		const form = row.form;
		const slug = requireDataset(form, ref);
		if (state !== null && state !== 'draft')
			throw new StateError(`The version is ${state.replace('_', ' ')}; only a draft can be made anew.`);
		const answers = row.versionId ? await answersOf(tx, row.versionId) : {};
		const place: Place = {
			datasetSlug: slug,
			actor: actor.id,
			answers,
			...(row.versionId ? { replaces: row.versionId } : {})
		};
		const draft = row.raw
			? await draftFromTable(
					tx,
					place,
					{ name: row.rawName ?? 'upload.txt', bytes: row.raw },
					parseInput(tableDescription, tableDescriptionOf(whole(row.raw, form)), NOT_WHOLE)
				)
			: await draftFromModel(
					tx,
					place,
					readModelJson(form.model ?? ''),
					parseInput(modelDescription, modelDescriptionOf(form), NOT_WHOLE)
				);
		await tx.update(upload).set({ versionId: draft.id }).where(own(actor, id));
		return { slug, number: draft.number, failed: draft.checks.some(({ severity }) => severity === 'fail') };
	});
}

const NOT_WHOLE = 'The description is not whole yet.';

function whole(raw: Uint8Array, form: UploadForm): UploadForm {
	const { guess } = previewOf(raw, form);
	return guess ? withGuess(form, guess) : form;
}

function requireDataset(form: UploadForm, ref: string | null): string {
	const slug = form.dataset?.trim() ?? '';
	if (!slug)
		throw new InvalidInput('The dataset is missing.', [
			{ path: 'dataset', message: 'name the dataset that this is a version of, or make one' }
		]);
	if (ref !== null && ref.split('@')[0] !== slug)
		throw new InvalidInput('A draft stays in its dataset.', [
			{
				path: 'dataset',
				message: `the draft is one of ${ref.split('@')[0]}; upload the file anew for another`
			}
		]);
	return slug;
}

async function answersOf(tx: Transaction, versionId: string): Promise<Record<string, string>> {
	const rows = await tx.execute<{ code: string; answer: string }>(
		sql`select code, answer from check_result where version_id = ${versionId} and answer is not null`
	);
	return Object.fromEntries(rows.map(({ code, answer }) => [code, answer]));
}

/** A new version that begins where an earlier one stands: its file or model, its columns, sources and sample. */
export async function startFrom(actor: SignedIn, slug: string, number: string): Promise<string> {
	const earlier = await versions.get(slug, number);
	const form: UploadForm = {
		dataset: slug,
		parent: number,
		source: earlier.sources.map((source) => source.slug).join(', '),
		quality: earlier.quality,
		...(earlier.qualityReason ? { qualityReason: earlier.qualityReason } : {}),
		...sampleForm(earlier.sample),
		...rangeForm('validRange', earlier.validRangeEv)
	};
	if (earlier.table?.raw) {
		const { name, bytes } = await versions.rawFile(slug, number);
		const { joined } = earlier.table;
		return start(
			actor,
			{ raw: { name, bytes } },
			{ ...form, ...endsForm(earlier.model), ...(joined ? { joined } : {}) }
		);
	}
	const model = JSON.stringify(earlier.model, null, '\t');
	return start(actor, { form: { ...form, model, ...rangeForm('measuredRange', earlier.measuredRangeEv) } });
}

function sampleForm(sample: Record<string, unknown> | null): UploadForm {
	return Object.fromEntries(
		Object.entries(sample ?? {})
			.filter(([, value]) => value !== null)
			.map(([name, value]) => [
				`sample.${name}`,
				name === 'compiled' ? (value ? 'compiled' : 'measured') : String(value)
			])
	);
}

const rangeForm = (name: string, range: { low: number; high: number } | null): UploadForm =>
	range ? { [`${name}.low`]: String(range.low), [`${name}.high`]: String(range.high) } : {};

function endsForm(model: PermittivityModel): UploadForm {
	if (model.kind !== 'table') return {};
	const low = Object.entries(model.lowEnd).map(([name, value]) => [`lowEnd.${name}`, String(value)]);
	const high = Object.entries(model.highEnd).map(([name, value]) => [`highEnd.${name}`, String(value)]);
	return Object.fromEntries([...low, ...high]);
}
