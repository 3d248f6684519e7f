import { rowsQuery } from '$lib/schemas/screening.ts';
import { parseInput } from '$lib/server/api/issues.ts';
import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { resultsOf } from '$lib/server/screening/results.ts';
import { rows } from '$lib/server/screening/rows.ts';
import * as screenings from '$lib/server/screening/screenings.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ params, url, locals }) =>
	answering(async () => {
		const asked = parseInput(rowsQuery, Object.fromEntries(url.searchParams));
		const { row } = await screenings.get(personOf(locals.principal), params.id);
		const { plan, statement, chunksDone, cells: total } = row;
		const { results, ranking } = await resultsOf({
			...{ id: params.id, plan, chunksDone },
			criterion: statement.criterion,
			cells: total
		});
		const cells = rows(plan, results, ranking, asked);
		const after = asked.from + cells.length;
		return Response.json(
			{ cells, total: ranking.length, next: after < ranking.length ? String(after) : null },
			{ headers: { 'cache-control': 'no-store' } }
		);
	});
