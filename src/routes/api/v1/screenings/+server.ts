import { newScreening } from '$lib/schemas/screening.ts';
import { answering } from '$lib/server/api/problem.ts';
import { parseInput } from '$lib/server/api/issues.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { acceptedJson } from '$lib/server/library/created.ts';
import * as screenings from '$lib/server/screening/screenings.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ url, locals }) =>
	answering(async () => {
		const query = parseInput(screenings.screeningQuery, Object.fromEntries(url.searchParams));
		const found = await screenings.list(personOf(locals.principal), query);
		return Response.json(found, { headers: { 'cache-control': 'no-store' } });
	});

export const POST: RequestHandler = (event) =>
	acceptedJson(event, newScreening, async (actor, fields) => ({
		screening: await screenings.create(actor, fields)
	}));
