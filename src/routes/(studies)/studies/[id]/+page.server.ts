import { fail, redirect } from '@sveltejs/kit';
import { z } from 'zod';
import { conduction } from '$lib/schemas/group-defaults.ts';
import { studyChange } from '$lib/schemas/saved-study.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import * as comments from '$lib/server/studies/comments.ts';
import * as groupDefaults from '$lib/server/studies/group-defaults.ts';
import { notesTree } from '$lib/server/studies/notes.ts';
import * as studies from '$lib/server/studies/studies.ts';
import { answered } from '../../../(library)/answered.ts';
import { loadStudy } from '../../load-study.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params, url }) => {
	const actor = personOf(locals.principal);
	const saved = await answered(() => studies.get(actor, params.id));
	// What the address says goes before what is saved: it is the state that somebody is looking at.
	const here = [...url.searchParams.keys()].some((name) => !name.startsWith('/'));
	const loaded = await loadStudy(here ? url.searchParams : new URLSearchParams(saved.study.query));
	return {
		...loaded,
		saved: saved.study,
		mayEdit: saved.mayEdit,
		own: saved.own,
		defaults: saved.study.group ? await groupDefaults.of(actor, saved.study.group.slug) : null,
		notes: notesTree(saved.study.notes),
		openComments: await comments.countOpen(params.id),
		groups: actor.groups.map(({ slug, name }) => ({ slug, name }))
	};
};

const decision = z.object({ revision: z.coerce.number().int(), conduction });

export const actions: Actions = {
	describe: async ({ request, params, locals }) => {
		const form = await request.formData();
		const typed = { name: field(form, 'name'), notes: field(form, 'notes') };
		const reasons = form.getAll('reason').map(String);
		const visibility = field(form, 'visibility');
		const group = field(form, 'group');
		const done = await attempt(() =>
			studies.change(
				personOf(locals.principal),
				params.id,
				parseForm(studyChange, {
					revision: Number(field(form, 'revision')),
					...typed,
					reasons,
					...(visibility === '' ? {} : { visibility, group: group === '' ? null : group })
				})
			)
		);
		if (done.failed) return fail(done.status, { ...done.refused, typed });
		redirect(303, `/studies/${params.id}`);
	},

	decide: async ({ request, params, locals }) => {
		const form = await request.formData();
		const done = await attempt(() =>
			groupDefaults.decide(
				personOf(locals.principal),
				params.id,
				parseForm(decision, { revision: field(form, 'revision'), conduction: field(form, 'conduction') })
			)
		);
		if (done.failed) return fail(done.status, done.refused);
		redirect(303, `/studies/${params.id}`);
	},

	duplicate: async ({ params, locals }) => {
		const made = await attempt(() => studies.duplicate(personOf(locals.principal), params.id));
		if (made.failed) return fail(made.status, made.refused);
		redirect(303, `/studies/${made.value.id}`);
	},

	archive: async ({ request, params, locals }) => {
		const form = await request.formData();
		const done = await attempt(() =>
			studies.change(
				personOf(locals.principal),
				params.id,
				parseForm(studyChange, {
					revision: Number(field(form, 'revision')),
					archived: field(form, 'archived') === 'yes'
				})
			)
		);
		if (done.failed) return fail(done.status, done.refused);
		redirect(303, field(form, 'archived') === 'yes' ? '/studies?show=archived' : `/studies/${params.id}`);
	}
};
