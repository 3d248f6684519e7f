import { and, eq, inArray } from 'drizzle-orm';
import type { ForcePoint, PermittivityModel } from '../../engine/contract.ts';
import { ENGINE_VERSION } from '../../engine/index.ts';
import type { ForceChange } from '../../schemas/comparison.ts';
import { forceRequest } from '../../schemas/force.ts';
import type { SignedIn } from '../../schemas/person.ts';
import { decodeStudy } from '../../schemas/study-address.ts';
import { choiceRequest } from '../../schemas/study-request.ts';
import { choiceLetter, slotsOf, materialIn } from '../../schemas/study-slots.ts';
import type { ModelChoice, Study } from '../../schemas/study.ts';
import type { StudyImpact } from '../../schemas/impact.ts';
import { runForces } from '../compute/forces.ts';
import { inputChecksum, pinnedVersions, resolveRequest } from '../compute/plan.ts';
import { database } from '../db/client.ts';
import { dataset } from '../db/schema/dataset.ts';
import { study } from '../db/schema/study.ts';
import { InvalidInput } from '../errors.ts';
import { pointOf } from '../library/force-change.ts';
import * as versions from '../library/versions.ts';
import { seenBy } from './access.ts';
import { studiesPinning, type PinningStudy } from './pins.ts';

/** What a version under review would do to the studies that rest on its dataset: each computed as it is and with the candidate. */

const STUDIES_MAX = 300;
const POINTS = 9;
const ACCURACY = 1e-6;

interface Candidate {
	ref: string;
	model: PermittivityModel;
}

/** How many studies there are to compute; then each of them as it comes, in the order in which they were saved. */
export async function* impactOf(
	actor: SignedIn,
	candidate: Candidate,
	signal: AbortSignal
): AsyncGenerator<{ of: number } | { done: number; impact: StudyImpact }> {
	const slug = candidate.ref.split('@')[0];
	const [home] = await database().select({ id: dataset.id }).from(dataset).where(eq(dataset.slug, slug));
	const pinning = home ? await studiesPinning(database(), home.id, STUDIES_MAX) : [];
	yield { of: pinning.length };
	const visible = await visibleAmong(actor, pinning);
	for (const [index, one] of pinning.entries()) {
		if (signal.aborted) return;
		const changes = await changesIn(one, candidate, signal);
		const { id, name } = one;
		// What one may not see is counted and measured, and has no name.
		yield { done: index + 1, impact: { study: visible.has(id) ? { id, name } : null, changes } };
	}
}

async function visibleAmong(actor: SignedIn, pinning: readonly PinningStudy[]): Promise<Set<string>> {
	if (pinning.length === 0) return new Set();
	const ids = pinning.map(({ id }) => id);
	const rows = await database()
		.select({ id: study.id })
		.from(study)
		.where(and(inArray(study.id, ids), seenBy(actor)));
	return new Set(rows.map(({ id }) => id));
}

/** One for each model choice that names a version of the dataset. */
async function changesIn(
	{ query, refs }: PinningStudy,
	candidate: Candidate,
	signal: AbortSignal
): Promise<ForceChange[]> {
	const { study: kept } = decodeStudy(new URLSearchParams(query));
	const changes: ForceChange[] = [];
	for (const [index, choice] of kept.choices.entries()) {
		const names = slotsOf(kept).flatMap((slot) => {
			const material = materialIn(kept, choice, slot);
			return [material?.version, material?.normal];
		});
		if (!names.some((name) => name !== undefined && refs.includes(name))) continue;
		const words = `${choiceLetter(index)} ${choice.name}`.trim();
		changes.push(await changeOf(kept, choice, words, refs, candidate, signal));
	}
	return changes;
}

/** The study's own range, and the separation of its hairline. */
function separationsOf({ fromNm, toNm, atNm }: Study): number[] {
	const spread = Array.from({ length: POINTS }, (_, index) =>
		Number((fromNm * (toNm / fromNm) ** (index / (POINTS - 1))).toPrecision(4))
	);
	return [...new Set([...spread, atNm])].sort((a, b) => a - b);
}

async function changeOf(
	kept: Study,
	choice: ModelChoice,
	words: string,
	refs: readonly string[],
	candidate: Candidate,
	signal: AbortSignal
): Promise<ForceChange> {
	const separations = separationsOf(kept);
	const asked = forceRequest.parse({
		...choiceRequest(kept, choice, separations, []),
		relativeAccuracy: ACCURACY
	});
	const named = await versions.resolve(pinnedVersions(asked));
	const computed = async (modelOf: (ref: string) => PermittivityModel | undefined) => {
		const request = resolveRequest(asked, modelOf);
		const plan = {
			request,
			inputChecksum: inputChecksum(request),
			engine: ENGINE_VERSION,
			runtime: `node ${process.version}`,
			versions: [],
			costSeconds: 0
		};
		return (await runForces(plan, { onStart: () => undefined, onPoints: () => undefined }, signal)).points;
	};
	const none = (why: string): ForceChange => ({
		arrangement: `${words}: ${why}`,
		points: [],
		largestPercent: null,
		signChanges: false
	});
	try {
		const before = await computed((ref) => named.get(ref)?.model);
		const after = await computed((ref) => (refs.includes(ref) ? candidate.model : named.get(ref)?.model));
		return together(words, separations, before, after);
	} catch (error) {
		if (error instanceof InvalidInput) return none(error.issues[0]?.message ?? error.message);
		throw error;
	}
}

function together(
	arrangement: string,
	separations: readonly number[],
	before: readonly ForcePoint[],
	after: readonly ForcePoint[]
): ForceChange {
	const pressure = ({ pressurePa, errorBound }: ForcePoint) => ({
		pressurePa,
		bound: Math.abs(pressurePa) * errorBound.pressure
	});
	const points = separations.map((separationNm, index) =>
		pointOf(separationNm, pressure(before[index]), pressure(after[index]))
	);
	const sizes = points.flatMap(({ percent, beyondBound }) =>
		percent === null ? [] : [beyondBound ? Math.abs(percent) : 0]
	);
	return {
		arrangement,
		points,
		largestPercent: sizes.length > 0 ? Math.max(...sizes) : null,
		signChanges: points.some(({ signChanges }) => signChanges)
	};
}
