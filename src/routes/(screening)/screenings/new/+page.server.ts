import { fail, redirect } from '@sveltejs/kit';
import {
	SCREENING_BEGIN,
	SCREENING_FIELDS,
	screeningFromForm,
	type ScreeningTyped
} from '$lib/schemas/screening-form.ts';
import { newScreening } from '$lib/schemas/screening.ts';
import { cellsIn, evaluationsIn } from '$lib/screening/cells.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, parseForm } from '$lib/server/people/attempt.ts';
import { estimatedSeconds, planScreening } from '$lib/server/screening/plan.ts';
import * as screenings from '$lib/server/screening/screenings.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals }) => ({
	begin: SCREENING_BEGIN,
	groups: personOf(locals.principal).groups.map(({ slug, name }) => ({ slug, name }))
});

function typedIn(form: FormData): ScreeningTyped {
	const typed: ScreeningTyped = {};
	for (const name of [...SCREENING_FIELDS, 'visibility'])
		typed[name] = form
			.getAll(name)
			.filter((value) => typeof value === 'string')
			.join(' ');
	return typed;
}

/** A group of one's own may see it, or nobody else. */
const shared = (typed: ScreeningTyped) => {
	const slug = typed.visibility ?? '';
	return slug === '' ? {} : { visibility: 'group', group: slug };
};

export const actions: Actions = {
	/** How much it is, without beginning it. */
	count: async ({ request }) => {
		const typed = typedIn(await request.formData());
		const counted = await attempt(async () => {
			const wanted = parseForm(newScreening, {
				...(screeningFromForm({ ...typed, name: typed.name || 'counted' }) as object)
			});
			const plan = await planScreening(wanted.statement);
			return {
				left: plan.left.length,
				media: plan.media.length,
				right: plan.right.length,
				cells: cellsIn(plan),
				evaluations: evaluationsIn(plan),
				seconds: estimatedSeconds(plan)
			};
		});
		if (counted.failed) return fail(counted.status, { ...counted.refused, typed });
		return { counted: counted.value, typed };
	},

	start: async ({ request, locals }) => {
		const typed = typedIn(await request.formData());
		const made = await attempt(() =>
			screenings.create(
				personOf(locals.principal),
				parseForm(newScreening, { ...(screeningFromForm(typed) as object), ...shared(typed) })
			)
		);
		if (made.failed) return fail(made.status, { ...made.refused, typed });
		redirect(303, `/screenings/${made.value.id}`);
	}
};
