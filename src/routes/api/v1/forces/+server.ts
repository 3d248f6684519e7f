import { streamLines, wantsLines } from '$lib/server/api/force-stream.ts';
import { parseInput } from '$lib/server/api/issues.ts';
import { answering } from '$lib/server/api/problem.ts';
import { planForces, runForces } from '$lib/server/compute/forces.ts';
import { callerGone } from '$lib/server/limits/caller-gone.ts';
import { chargeComputing } from '$lib/server/limits/computing.ts';
import { readJson } from '$lib/server/limits/read-json.ts';
import { forceRequest } from '$lib/schemas/force.ts';
import type { RequestHandler } from './$types';

/** Room for a few tables of the largest size; a curve of pinned versions needs a thousandth of it. */
const BODY_MAX = 4 * 2 ** 20;

const ignore = { onStart: () => undefined, onPoints: () => undefined };

export const POST: RequestHandler = ({ request, getClientAddress, platform }) =>
	answering(async () => {
		const plan = await planForces(parseInput(forceRequest, await readJson(request, BODY_MAX)));
		await chargeComputing(getClientAddress(), plan.costSeconds);

		const { gone, forget } = callerGone(request, platform);
		if (wantsLines(request)) {
			return streamLines(plan, (progress, signal) => runForces(plan, progress, signal).finally(forget), gone);
		}
		const result = await runForces(plan, ignore, gone).finally(forget);
		return Response.json(result, { headers: { 'cache-control': 'no-store' } });
	});
