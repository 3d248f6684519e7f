import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import * as screenings from '$lib/server/screening/screenings.ts';
import { permittivityOrder } from '$lib/server/screening/why.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals, params, url }) =>
	answering(async () => {
		const { row } = await screenings.get(personOf(locals.principal), params.id);
		const [cell, at] = ['cell', 'at'].map((name) => Number(url.searchParams.get(name) ?? 0));
		return Response.json(await permittivityOrder(row.plan, cell, at), {
			headers: { 'cache-control': 'private, max-age=600' }
		});
	});
