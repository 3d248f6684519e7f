import { answering } from '$lib/server/api/problem.ts';
import { readerOf } from '$lib/server/records/access.ts';
import * as records from '$lib/server/records/records.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ params, locals }) =>
	answering(async () => {
		const { record } = await records.get(readerOf(locals.principal), params.checksum);
		return Response.json({ record }, { headers: { 'cache-control': 'no-store' } });
	});
