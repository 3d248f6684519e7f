import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { revokeOwn } from '$lib/server/people/tokens.ts';
import type { RequestHandler } from './$types';

export const DELETE: RequestHandler = ({ params, locals }) =>
	answering(async () => {
		await revokeOwn(personOf(locals.principal), params.id);
		return new Response(null, { status: 204 });
	});
