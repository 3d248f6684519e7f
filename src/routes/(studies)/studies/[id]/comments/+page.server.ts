import { fail } from '@sveltejs/kit';
import { newComment } from '$lib/schemas/comment.ts';
import { decodeStudy } from '$lib/schemas/study-address.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import * as comments from '$lib/server/studies/comments.ts';
import * as studies from '$lib/server/studies/studies.ts';
import { answered } from '../../../../(library)/answered.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) =>
	answered(async () => {
		const actor = personOf(locals.principal);
		const { study, mayEdit } = await studies.get(actor, params.id);
		return {
			study,
			mayEdit,
			me: actor.name,
			choices: decodeStudy(new URLSearchParams(study.query)).study.choices.map(({ name }) => name),
			comments: await comments.list(actor, params.id)
		};
	});

const numeric = (text: string) => (text.trim() === '' ? null : Number(text));

export const actions: Actions = {
	add: async ({ request, params, locals }) => {
		const form = await request.formData();
		const typed = {
			text: field(form, 'text'),
			choice: field(form, 'choice'),
			separationNm: field(form, 'separationNm')
		};
		const done = await attempt(() =>
			comments.add(
				personOf(locals.principal),
				params.id,
				parseForm(newComment, {
					text: typed.text,
					choice: numeric(typed.choice),
					separationNm: numeric(typed.separationNm)
				})
			)
		);
		return done.failed ? fail(done.status, { ...done.refused, typed }) : { said: 'The comment is there.' };
	},

	resolve: async ({ request, params, locals }) => {
		const id = field(await request.formData(), 'comment');
		const done = await attempt(() => comments.resolve(personOf(locals.principal), params.id, id));
		return done.failed ? fail(done.status, done.refused) : { said: 'The comment is settled.' };
	}
};
