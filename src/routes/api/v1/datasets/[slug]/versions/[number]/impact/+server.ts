import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import * as reviewing from '$lib/server/library/reviewing.ts';
import { impactOf } from '$lib/server/studies/impact.ts';
import { byImpact, type StudyImpact } from '$lib/schemas/impact.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ params, locals, request }) =>
	answering(async () => {
		const actor = personOf(locals.principal);
		const { version, changes } = await reviewing.candidate(actor, params.slug, params.number);
		const studies: StudyImpact[] = [];
		for await (const line of impactOf(actor, { ref: version.ref, model: version.model }, request.signal)) {
			if ('impact' in line) studies.push(line.impact);
		}
		return Response.json(
			{ impact: { arrangements: changes, studies: studies.sort(byImpact) } },
			{ headers: { 'cache-control': 'no-store' } }
		);
	});
