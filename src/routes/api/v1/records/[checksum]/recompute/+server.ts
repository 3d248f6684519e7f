import { answering } from '$lib/server/api/problem.ts';
import { callerGone } from '$lib/server/limits/caller-gone.ts';
import { chargeComputing } from '$lib/server/limits/computing.ts';
import { readerOf } from '$lib/server/records/access.ts';
import { recompute } from '$lib/server/records/recompute.ts';
import * as records from '$lib/server/records/records.ts';
import type { RequestHandler } from './$types';

/** Nothing is kept of it, so repeating it needs no key. */
export const POST: RequestHandler = ({ request, params, locals, getClientAddress, platform }) =>
	answering(async () => {
		const { record } = await records.get(readerOf(locals.principal), params.checksum);
		const { gone, forget } = callerGone(request, platform);
		const recomputation = await recompute(record.content, {
			charge: (seconds) => chargeComputing(getClientAddress(), seconds),
			signal: gone
		}).finally(forget);
		return Response.json({ recomputation }, { headers: { 'cache-control': 'no-store' } });
	});
