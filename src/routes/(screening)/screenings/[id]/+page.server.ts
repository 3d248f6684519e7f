import { fail, redirect } from '@sveltejs/kit';
import { rowsQuery } from '$lib/schemas/screening.ts';
import { FIGURES, windowOf } from '$lib/screening/criteria.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field } from '$lib/server/people/attempt.ts';
import { citation, differences } from '$lib/server/screening/exports.ts';
import { grid, rightNames, rows } from '$lib/server/screening/rows.ts';
import * as screenings from '$lib/server/screening/screenings.ts';
import { answered } from '../../../(library)/answered.ts';
import { loadResults } from '../../load-results.ts';
import type { Actions, PageServerLoad } from './$types';

const FIRST_ROWS = 100;

export const load: PageServerLoad = ({ locals, params, url }) =>
	answered(async () => {
		const actor = personOf(locals.principal);
		const { found, results, ranking } = await loadResults(actor, params.id);
		const { screening, row, own } = found;
		const asked = rowsQuery.safeParse(Object.fromEntries(url.searchParams)).data ?? rowsQuery.parse({});
		// Unasked, the hairline stands at the beginning of the window.
		const [first = 0] = windowOf(row.statement.criterion, row.plan.separationsNm);
		const wanted = url.searchParams.has('at') ? asked.at : first;
		const at = Math.min(wanted, row.plan.separationsNm.length - 1);
		const right = Number(url.searchParams.get('right') ?? 0) || 0;
		const basis = row.basisId === null ? null : await loadResults(actor, row.basisId).catch(() => null);
		return {
			screening,
			own,
			groups: actor.groups.map(({ slug, name }) => ({ slug, name })),
			statement: row.statement,
			figure: FIGURES[row.statement.criterion.kind],
			separationsNm: row.plan.separationsNm,
			rules: row.plan.rules,
			at,
			right,
			rightNames: rightNames(row.plan),
			grid: grid(row.plan, results, ranking, { right, at, temperature: 0 }),
			total: ranking.length,
			qualifying: ranking.filter(({ qualifies }) => qualifies).length,
			from: asked.from,
			rows: rows(row.plan, results, ranking, { at, from: asked.from, count: FIRST_ROWS }),
			cells: ranking.slice(asked.from, asked.from + FIRST_ROWS).map(({ cell }) => cell),
			citation: citation(screening, row.engine, url.origin),
			engine: row.engine,
			basis: basis && {
				id: basis.found.screening.id,
				name: basis.found.screening.name,
				...differences(
					{ plan: basis.found.row.plan, results: basis.results, ranking: basis.ranking },
					{ plan: row.plan, results, ranking }
				)
			}
		};
	});

const STEPS = { cancel: screenings.cancel, pause: screenings.pause, resume: screenings.resume } as const;

const step =
	(name: keyof typeof STEPS): Actions[string] =>
	async ({ locals, params }) => {
		const done = await attempt(() => STEPS[name](personOf(locals.principal), params.id ?? ''));
		return done.failed ? fail(done.status, done.refused) : { said: 'done' };
	};

export const actions: Actions = {
	cancel: step('cancel'),
	pause: step('pause'),
	resume: step('resume'),
	share: async ({ request, locals, params }) => {
		const slug = field(await request.formData(), 'visibility');
		const to =
			slug === ''
				? { visibility: 'private' as const, group: null }
				: { visibility: 'group' as const, group: slug };
		const done = await attempt(() => screenings.share(personOf(locals.principal), params.id, to));
		return done.failed ? fail(done.status, done.refused) : { said: 'done' };
	},
	repeat: async ({ locals, params }) => {
		const made = await attempt(() => screenings.repeat(personOf(locals.principal), params.id));
		if (made.failed) return fail(made.status, made.refused);
		redirect(303, `/screenings/${made.value.id}`);
	}
};
