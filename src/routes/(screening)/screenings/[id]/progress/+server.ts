import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import * as screenings from '$lib/server/screening/screenings.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals, params }) =>
	answering(async () => {
		const { screening } = await screenings.get(personOf(locals.principal), params.id);
		return Response.json({ screening }, { headers: { 'cache-control': 'no-store' } });
	});
