import { personOf } from '$lib/server/auth/require.ts';
import { exportData } from '$lib/server/people/account.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async ({ locals }) =>
	new Response(JSON.stringify(await exportData(personOf(locals.principal)), null, '\t'), {
		headers: {
			'content-type': 'application/json; charset=utf-8',
			'content-disposition': 'attachment; filename="hairsbreadth-account.json"'
		}
	});
