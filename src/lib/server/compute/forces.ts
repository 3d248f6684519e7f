import { ENGINE_VERSION, Refusal, estimateCost } from '../../engine/index.ts';
import type { ForceAnswer, ForcePoint, ForceRequest } from '../../engine/contract.ts';
import { checkRequest } from '../../engine/validate.ts';
import type { ForceRequestComplete } from '../../schemas/force.ts';
import type { ResolvedVersion } from '../../schemas/version.ts';
import { InvalidInput } from '../errors.ts';
import * as versions from '../library/versions.ts';
import { inputChecksum, pinnedVersions, resolveRequest } from './plan.ts';
import { enginePool, type Progress } from './pool.ts';
import { ResultCache } from './result-cache.ts';

/** Computes forces for whoever asks: versions resolved, cost known before, equal questions computed once. */

/** Estimated seconds above which a computation is not begun. */
export const COST_CAP_SECONDS = 30;
const CACHE_BYTES = 64 * 2 ** 20;

const cache = new ResultCache(CACHE_BYTES);

/** What the answer says about a version that it rests on. */
export type UsedVersion = Pick<
	ResolvedVersion,
	'ref' | 'checksum' | 'state' | 'quality' | 'qualityReason' | 'supersededBy'
>;

/** A computation that may begin: checked, priced, not yet started. */
export interface ForcePlan {
	request: ForceRequest;
	inputChecksum: string;
	engine: string;
	/** The last digits of exp and log belong to the runtime: equal bits are promised on the same one. */
	runtime: string;
	versions: UsedVersion[];
	/** Seconds that it will take; zero when the answer is there already. */
	costSeconds: number;
}

export interface ForceResult extends ForceAnswer {
	inputChecksum: string;
	runtime: string;
	versions: UsedVersion[];
	separationsNm: number[];
}

/** @throws InvalidInput for a version that does not exist, for what the engine refuses and for work above the cap */
export async function planForces(complete: ForceRequestComplete): Promise<ForcePlan> {
	const refs = pinnedVersions(complete);
	const resolved = refs.length > 0 ? await versions.resolve(refs) : new Map<string, ResolvedVersion>();
	const request = resolveRequest(
		complete,
		(ref) => resolved.get(ref)?.model,
		(ref) => resolved.get(ref)?.uncertainty
	);
	const plan = {
		request,
		inputChecksum: inputChecksum(request),
		engine: ENGINE_VERSION,
		runtime: `node ${process.version}`,
		versions: refs.flatMap((ref) => describeUse(resolved.get(ref))),
		costSeconds: 0
	};
	return cache.has(cacheKey(plan)) ? plan : { ...plan, costSeconds: price(request) };
}

function describeUse(version: ResolvedVersion | undefined): UsedVersion[] {
	if (!version) return [];
	const { ref, checksum, state, quality, qualityReason, supersededBy } = version;
	return [{ ref, checksum, state, quality, qualityReason, supersededBy }];
}

function price(request: ForceRequest): number {
	// Refused here and not in a thread: an absurd request must not wait behind reasonable ones to be told so.
	refusing(() => checkRequest(request));
	const { seconds } = estimateCost(request);
	if (seconds <= COST_CAP_SECONDS) return seconds;
	const about = seconds < 1000 ? seconds.toFixed(0) : seconds.toExponential(0);
	throw new InvalidInput(
		`This would take about ${about} s; at most ${COST_CAP_SECONDS} s are computed at once.`,
		[{ path: 'separationsNm', message: 'ask for fewer or larger separations, or for less accuracy' }],
		'too-costly'
	);
}

/** The engine's refusals are answers, not accidents. */
function refusing<T>(work: () => T): T {
	try {
		return work();
	} catch (error) {
		if (!(error instanceof Refusal)) throw error;
		throw new InvalidInput('The engine cannot compute this request.', error.issues, 'refused');
	}
}

function cacheKey({
	inputChecksum,
	engine,
	runtime
}: Pick<ForcePlan, 'inputChecksum' | 'engine' | 'runtime'>): string {
	return `${inputChecksum} ${engine} ${runtime}`;
}

/** @throws as `EnginePool.run` */
export async function runForces(
	plan: ForcePlan,
	progress: Progress,
	signal: AbortSignal
): Promise<ForceResult> {
	const { separationsNm, points, ...end } = await cache.get(
		cacheKey(plan),
		(inner, innerSignal) => enginePool().run(plan.request, inner, innerSignal),
		progress,
		signal
	);
	const { engine, runtime, inputChecksum, versions } = plan;
	return { engine, runtime, inputChecksum, versions, separationsNm, points, ...end };
}

/** The same question computed once more, whatever was kept of it. */
export async function computeAfresh({ request }: ForcePlan, signal: AbortSignal): Promise<ForcePoint[]> {
	const points: ForcePoint[] = [];
	const onPoints = ({ indices, points: some }: { indices: number[]; points: ForcePoint[] }) =>
		indices.forEach((index, place) => (points[index] = some[place]));
	await enginePool().run(request, { onStart: () => undefined, onPoints }, signal);
	return points;
}
