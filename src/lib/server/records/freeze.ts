import { eq, inArray } from 'drizzle-orm';
import { ENGINE_VERSION } from '../../engine/index.ts';
import { curveSeparationsNm } from '../../schemas/curve-separations.ts';
import { forceRequest } from '../../schemas/force.ts';
import type { SignedIn } from '../../schemas/person.ts';
import {
	RECORD_FORMAT,
	type FreezeFields,
	type RecordChoice,
	type RecordContent,
	type RecordVersion
} from '../../schemas/record.ts';
import { decodeStudy } from '../../schemas/study-address.ts';
import { choiceRequest } from '../../schemas/study-request.ts';
import { choiceLetter, versionsOf } from '../../schemas/study-slots.ts';
import type { Study } from '../../schemas/study.ts';
import { epsilonShares } from '../../engine/index.ts';
import { factsOf } from '../library/facts-of.ts';
import { studyTitle } from '../../study-sheet/title-block.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { planForces, runForces, type ForcePlan } from '../compute/forces.ts';
import { database, type Transaction } from '../db/client.ts';
import { studyPin, study as studyTable } from '../db/schema/study.ts';
import { record, recordAccess, recordPin } from '../db/schema/record.ts';
import { Conflict, Forbidden, InvalidInput } from '../errors.ts';
import { canonicalJson, sha256 } from '../library/canonical.ts';
import { plain } from '../library/citation.ts';
import * as versions from '../library/versions.ts';
import * as studies from '../studies/studies.ts';

/** Makes a record of a study: computed anew, written down with its inputs, named by the checksum of all of it. */

const ignore = { onStart: () => undefined, onPoints: () => undefined };

/**
 * @param charge  told the seconds that the computation will take, before it begins
 * @param origin  of the addresses inside the citations
 * @returns checksum of the record
 * @throws Forbidden for who only reads the study, Conflict where another state was saved meanwhile, InvalidInput where a
 *   version is missing, withdrawn, or a choice cannot be computed
 */
export async function freeze(
	actor: SignedIn,
	studyId: string,
	fields: FreezeFields,
	{
		charge,
		origin,
		signal
	}: { charge: (seconds: number) => Promise<void>; origin: string; signal: AbortSignal }
): Promise<string> {
	const { study: saved, mayEdit } = await studies.get(actor, studyId);
	if (!mayEdit)
		throw new Forbidden('A study is frozen by who works on it. Duplicate it to freeze your copy.');
	requireState(saved.revision, fields.revision);
	if (fields.visibility === 'group' && !saved.group)
		throw new InvalidInput('The study belongs to no group.', [
			{ path: 'visibility', message: 'private, signed-in or everybody; or give the study a group first' }
		]);

	const { study, problems } = decodeStudy(new URLSearchParams(saved.query));
	if (problems.length > 0)
		throw new InvalidInput(
			'The study has parts that cannot be read; correct them first.',
			problems.map(({ part, message }) => ({ path: part, message }))
		);
	const used = await usedVersions(study, origin);
	const plans = await Promise.all(study.choices.map((_, index) => planOf(study, index)));
	await charge(plans.reduce((sum, { plan }) => sum + plan.costSeconds, 0));
	const choices: RecordChoice[] = [];
	for (const [index, { asked, plan }] of plans.entries()) {
		const { points, equilibria, warnings } = await runForces(plan, ignore, signal);
		choices.push({
			letter: choiceLetter(index),
			name: study.choices[index].name,
			reason: saved.reasons[index] ?? '',
			request: asked,
			inputChecksum: plan.inputChecksum,
			...{ points, equilibria, warnings }
		});
	}

	const frozenAt = now();
	const content: RecordContent = {
		format: RECORD_FORMAT,
		name: saved.name,
		title: used.title,
		authors: fields.authors,
		group: saved.group?.name ?? null,
		frozenAt: frozenAt.toISOString(),
		study: { id: studyId, revision: saved.revision },
		notes: saved.notes,
		query: saved.query,
		engine: ENGINE_VERSION,
		runtime: plans[0].plan.runtime,
		versions: used.versions,
		choices
	};
	const text = canonicalJson(content);
	const checksum = sha256(text).replace('sha256:', '');
	await database().transaction(async (tx) => {
		const [locked] = await tx.select().from(studyTable).where(eq(studyTable.id, studyId)).for('update');
		requireState(locked.revision, fields.revision);
		await tx.insert(record).values({
			...{ checksum, content: text, studyId, name: saved.name, frozenAt },
			frozenBy: actor.id
		});
		await pinLike(tx, studyId, checksum);
		await tx.insert(recordAccess).values({
			...{ checksum, visibility: fields.visibility },
			ownerId: locked.ownerId,
			groupId: locked.groupId,
			changedAt: frozenAt
		});
		await appendAudit(tx, {
			actor: actor.id,
			action: 'record.freeze',
			objectType: 'record',
			objectId: checksum,
			details: { study: studyId, revision: saved.revision, visibility: fields.visibility }
		});
	});
	return checksum;
}

function requireState(is: number, wanted: number): void {
	if (is !== wanted)
		throw new Conflict('The study was saved again meanwhile. Look at its present state and freeze that.');
}

/** Everything the study names is published; a withdrawn input would make a record that is flagged from its first day. */
async function usedVersions(
	study: Study,
	origin: string
): Promise<{ title: string; versions: RecordVersion[] }> {
	const refs = versionsOf(study);
	const resolved = await versions.resolve(refs);
	const bad = refs.flatMap((ref) => {
		const state = resolved.get(ref)?.state;
		if (state === 'published') return [];
		return [
			{
				path: 'query',
				message: `${ref} ${state === 'withdrawn' ? 'was withdrawn' : 'is not in the library'}: take another version`
			}
		];
	});
	if (bad.length > 0) throw new InvalidInput('The study rests on data that cannot be frozen.', bad);
	const facts = Object.fromEntries([...resolved].map(([ref, one]) => [ref, factsOf(one, epsilonShares)]));
	const details = await Promise.all(
		refs.map((ref) => {
			const [slug, number] = ref.split('@');
			return versions.get(slug, number);
		})
	);
	return {
		title: studyTitle(study, facts),
		versions: details.map((detail) => ({
			ref: detail.ref,
			checksum: detail.checksum,
			title: detail.dataset.title,
			material: detail.material.name,
			quality: detail.quality,
			citation: plain(detail, origin)
		}))
	};
}

async function planOf(
	study: Study,
	index: number
): Promise<{ asked: Record<string, unknown>; plan: ForcePlan }> {
	const asked = forceRequest.parse(choiceRequest(study, study.choices[index], curveSeparationsNm(study)));
	return { asked: { ...asked }, plan: await planForces(asked) };
}

/** The pins of the study as they are now, under its lock. */
async function pinLike(tx: Transaction, studyId: string, checksum: string): Promise<void> {
	const pins = await tx
		.select({ versionId: studyPin.versionId })
		.from(studyPin)
		.where(inArray(studyPin.studyId, [studyId]));
	if (pins.length > 0)
		await tx.insert(recordPin).values(pins.map(({ versionId }) => ({ checksum, versionId })));
}
