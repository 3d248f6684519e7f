import { rowsQuery } from '$lib/schemas/screening.ts';
import { parseInput } from '$lib/server/api/issues.ts';
import { answering } from '$lib/server/api/problem.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { rows } from '$lib/server/screening/rows.ts';
import { loadResults } from '../../../load-results.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals, params, url }) =>
	answering(async () => {
		const asked = parseInput(rowsQuery, Object.fromEntries(url.searchParams));
		const { found, results, ranking } = await loadResults(personOf(locals.principal), params.id);
		return Response.json(
			{
				total: ranking.length,
				rows: rows(found.row.plan, results, ranking, asked),
				cells: ranking.slice(asked.from, asked.from + asked.count).map(({ cell }) => cell)
			},
			{ headers: { 'cache-control': 'no-store' } }
		);
	});
