import { and, asc, eq } from 'drizzle-orm';
import type { SignedIn } from '../../schemas/person.ts';
import type { Approval, Recommendation, RefusalOfVersion, Submission } from '../../schemas/upload.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database, type Transaction } from '../db/client.ts';
import { upload } from '../db/schema/curation.ts';
import { checkResult, dataset, version } from '../db/schema/dataset.ts';
import { material } from '../db/schema/material.ts';
import { Conflict, Forbidden, InvalidInput, NotFound, StateError } from '../errors.ts';
import { tellOfPublication, tellOfWithdrawal } from '../studies/tell-owners.ts';
import { takeStep } from './review.ts';
import { reviewers, tell } from './tell.ts';
import { visibleTo } from './viewer.ts';
import { partsOf, refOf } from './versions.ts';

/** What a curator can do with a version: each one transaction, with its audit row and what is told to whom. */

interface Found {
	id: string;
	ref: string;
	title: string;
	note: string | null;
	datasetId: string;
	major: number;
	minor: number;
	state: string;
	createdBy: string;
	submittedBy: string | null;
	submittedAt: Date | null;
}

/** @throws NotFound where there is none, or none that this person may see */
async function find(tx: Transaction, actor: SignedIn, slug: string, number: string): Promise<Found> {
	const parts = partsOf(refOf(slug, number));
	const [found] = parts
		? await tx
				.select({ row: version, dataset, material: material.name })
				.from(version)
				.innerJoin(dataset, eq(version.datasetId, dataset.id))
				.innerJoin(material, eq(dataset.materialId, material.id))
				.where(
					and(
						eq(dataset.slug, slug),
						eq(version.major, parts.major),
						eq(version.minor, parts.minor),
						visibleTo({ personId: actor.id, isCurator: actor.role === 'curator' })
					)
				)
		: [];
	if (!found) throw new NotFound(`There is no version ${number} of a dataset "${slug}".`);
	const { id, note, datasetId, major, minor, state, createdBy, submittedBy, submittedAt } = found.row;
	return {
		id,
		ref: refOf(slug, number),
		title: `${found.material}: ${found.dataset.title}`,
		note,
		datasetId,
		major,
		minor,
		state,
		createdBy,
		submittedBy,
		submittedAt
	};
}

/**
 * Hands a draft in for review, with an answer to each warning.
 *
 * @throws Forbidden for another one's draft; InvalidInput while a check fails or a warning has no answer; StateError and
 * Conflict where the version has moved on
 */
export async function submit(
	actor: SignedIn,
	slug: string,
	number: string,
	{ checksum, reason, answers }: Submission
): Promise<void> {
	await database().transaction(async (tx) => {
		const found = await find(tx, actor, slug, number);
		if (found.createdBy !== actor.id)
			throw new Forbidden('A draft is submitted by the person who made it. Make a version of your own.');
		await keepAnswers(tx, found.id, answers);
		await requireAnswered(tx, found.id);
		await takeStep(tx, 'submit', {
			versionId: found.id,
			checksum,
			actor: actor.id,
			now: now(),
			reason: reason ?? undefined
		});
		await tell(tx, await reviewers(tx, [actor.id]), {
			kind: 'review-wanted',
			ref: found.ref,
			title: found.title,
			by: actor.name,
			note: found.note
		});
	});
}

/** Keeps what was answered so far, also where it is not everything yet; a draft only. */
export async function answer(
	actor: SignedIn,
	slug: string,
	number: string,
	answers: Record<string, string>
): Promise<void> {
	await database().transaction(async (tx) => {
		const found = await find(tx, actor, slug, number);
		if (found.createdBy !== actor.id) throw new Forbidden('Only its maker answers for a draft.');
		await keepAnswers(tx, found.id, answers);
	});
}

async function keepAnswers(tx: Transaction, id: string, answers: Record<string, string>): Promise<void> {
	// The lock orders this against a submission under way; a version that has left draft is refused by takeStep.
	const [{ state }] = await tx
		.select({ state: version.state })
		.from(version)
		.where(eq(version.id, id))
		.for('update');
	if (state !== 'draft') return;
	const checks = await checksOf(tx, id);
	for (const [code, text] of Object.entries(answers)) {
		const check = checks.find((one) => one.code === code);
		if (check?.severity !== 'warn') {
			throw new InvalidInput('An answer belongs to no warning.', [
				{ path: `answers.${code}`, message: 'this version has no warning of that name; leave it out' }
			]);
		}
		await tx
			.update(checkResult)
			.set({ answer: text })
			.where(and(eq(checkResult.versionId, id), eq(checkResult.code, code)));
	}
}

const checksOf = (tx: Transaction, id: string) =>
	tx.select().from(checkResult).where(eq(checkResult.versionId, id)).orderBy(asc(checkResult.position));

async function requireAnswered(tx: Transaction, id: string): Promise<void> {
	const issues = (await checksOf(tx, id)).flatMap(({ code, severity, message, answer: given }) => {
		if (severity === 'fail') return [{ path: `checks.${code}`, message: `this check fails: ${message}` }];
		if (severity === 'warn' && !given?.trim())
			return [{ path: `answers.${code}`, message: `say why this may stand: ${message}` }];
		return [];
	});
	if (issues.length > 0)
		throw new InvalidInput(
			'A version is submitted with its checks passed and each warning answered.',
			issues
		);
}

/** @throws Forbidden for the person who made or submitted it */
function requireAnother(actor: SignedIn, { createdBy, submittedBy }: Found): void {
	if (actor.id === createdBy || actor.id === submittedBy)
		throw new Forbidden('Nobody reviews what they submitted themselves. Another curator has to look at it.');
}

/** The checksum is of the model; a version that was returned and came again may differ in what is said about it. */
function requireSameSubmission(found: Found, submittedAt: string | undefined): void {
	if (submittedAt !== undefined && found.submittedAt?.toISOString() !== submittedAt)
		throw new Conflict('The version was submitted anew since you saw it. Look at it again and repeat.');
}

const makersOf = ({ createdBy, submittedBy }: Found) =>
	submittedBy ? [createdBy, submittedBy] : [createdBy];

/** Publishes a version, with the checksum that the reviewer saw. */
export async function approve(
	actor: SignedIn,
	slug: string,
	number: string,
	{ checksum, reason, submittedAt }: Approval
): Promise<void> {
	await database().transaction(async (tx) => {
		const found = await find(tx, actor, slug, number);
		requireAnother(actor, found);
		requireSameSubmission(found, submittedAt);
		await takeStep(tx, 'publish', {
			versionId: found.id,
			checksum,
			actor: actor.id,
			now: now(),
			reason: reason ?? undefined
		});
		await tx.delete(upload).where(eq(upload.versionId, found.id));
		await tell(tx, makersOf(found), {
			kind: 'version-published',
			ref: found.ref,
			title: found.title,
			by: actor.name,
			reason: reason ?? null
		});
		await tellOfPublication(tx, found.datasetId, { ...found, by: actor.name, actorId: actor.id });
	});
}

/** Gives a version back to its maker as a draft, saying why. */
export async function giveBack(
	actor: SignedIn,
	slug: string,
	number: string,
	{ checksum, reason, submittedAt }: RefusalOfVersion
): Promise<void> {
	await database().transaction(async (tx) => {
		const found = await find(tx, actor, slug, number);
		requireAnother(actor, found);
		requireSameSubmission(found, submittedAt);
		await takeStep(tx, 'return', { versionId: found.id, checksum, actor: actor.id, now: now(), reason });
		await tell(tx, makersOf(found), {
			kind: 'version-returned',
			ref: found.ref,
			title: found.title,
			by: actor.name,
			reason
		});
	});
}

/** Takes a published version back for everybody; its address stays and says why. */
export async function withdraw(
	actor: SignedIn,
	slug: string,
	number: string,
	{ checksum, reason }: RefusalOfVersion
): Promise<void> {
	await database().transaction(async (tx) => {
		const found = await find(tx, actor, slug, number);
		await takeStep(tx, 'withdraw', { versionId: found.id, checksum, actor: actor.id, now: now(), reason });
		if (await isRecommended(tx, found)) {
			await setRecommended(tx, actor, found.datasetId, null, `${found.ref} is withdrawn.`);
		}
		const told = makersOf(found).filter((id) => id !== actor.id);
		await tell(tx, told.filter(isAccount), {
			kind: 'version-withdrawn',
			ref: found.ref,
			title: found.title,
			by: actor.name,
			reason
		});
		await tellOfWithdrawal(tx, found.datasetId, { ...found, by: actor.name, actorId: actor.id, reason });
	});
}

/** Says which published version of a dataset the curators recommend, apart from which is the newest. */
export async function recommend(
	actor: SignedIn,
	slug: string,
	number: string,
	{ reason }: Recommendation
): Promise<void> {
	await database().transaction(async (tx) => {
		const found = await find(tx, actor, slug, number);
		if (found.state !== 'published')
			throw new StateError(`Only a published version is recommended; this one is ${found.state}.`);
		await setRecommended(tx, actor, found.datasetId, found, reason);
	});
}

async function isRecommended(tx: Transaction, { datasetId, major, minor }: Found): Promise<boolean> {
	const [row] = await tx.select().from(dataset).where(eq(dataset.id, datasetId)).for('update');
	return row.recommendedMajor === major && row.recommendedMinor === minor;
}

async function setRecommended(
	tx: Transaction,
	actor: SignedIn,
	datasetId: string,
	chosen: Pick<Found, 'major' | 'minor' | 'ref'> | null,
	reason: string
): Promise<void> {
	await tx
		.update(dataset)
		.set({ recommendedMajor: chosen?.major ?? null, recommendedMinor: chosen?.minor ?? null })
		.where(eq(dataset.id, datasetId));
	await appendAudit(tx, {
		actor: actor.id,
		action: 'dataset.recommend',
		objectType: 'dataset',
		objectId: datasetId,
		details: { version: chosen?.ref ?? null, reason }
	});
}

/** What the installation itself published has no account to be told. */
const isAccount = (actor: string) => /^[0-9a-f]{8}-[0-9a-f-]{27}$/.test(actor);
