import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import * as screenings from '$lib/server/screening/screenings.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ params, locals }) =>
	answering(async () => {
		const { screening, row } = await screenings.get(personOf(locals.principal), params.id);
		return Response.json(
			{ screening: { ...screening, statement: row.statement } },
			{ headers: { 'cache-control': 'no-store' } }
		);
	});
