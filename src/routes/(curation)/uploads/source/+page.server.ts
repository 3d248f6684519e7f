import { fail } from '@sveltejs/kit';
import { sourceFields, sourceKind } from '$lib/schemas/source.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { addSource } from '$lib/server/library/additions.ts';
import { readBibtex } from '$lib/server/library/bibtex.ts';
import { sourceText } from '$lib/server/library/citation.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = () => ({ kinds: sourceKind.options });

const NAMES = [
	'slug',
	'title',
	'authors',
	'year',
	'kind',
	'container',
	'volume',
	'pages',
	'doi',
	'url',
	'licence',
	'note',
	'bibtex'
] as const;

const typedIn = (form: FormData): Record<string, string> =>
	Object.fromEntries(NAMES.map((name) => [name, field(form, name)]));

const textual = (text: string) => (text.trim() === '' ? null : text);

function fieldsOf(typed: Record<string, string>) {
	return parseForm(sourceFields, {
		slug: typed.slug,
		title: typed.title,
		authors: typed.authors
			.split('\n')
			.map((author) => author.trim())
			.filter(Boolean),
		year: Number(typed.year),
		kind: typed.kind,
		container: textual(typed.container),
		volume: textual(typed.volume),
		pages: textual(typed.pages),
		doi: textual(typed.doi),
		url: textual(typed.url),
		licence: textual(typed.licence),
		note: textual(typed.note)
	});
}

export const actions: Actions = {
	/** BibTeX into the fields, and what stands in them as a citation: nothing is stored. */
	read: async ({ request }) => {
		const typed = typedIn(await request.formData());
		const read = await attempt(async () => {
			const filled = typed.bibtex.trim() === '' ? typed : { ...typed, ...readBibtex(typed.bibtex) };
			return { filled, citation: sourceText(fieldsOf(filled)) };
		});
		if (!read.failed) return { typed: read.value.filled, citation: read.value.citation };
		// What was read stays in the fields even where one of them is not complete yet.
		const filled = await attempt(async () => ({ ...typed, ...readBibtex(typed.bibtex) }));
		return fail(read.status, { ...read.refused, typed: filled.failed ? typed : filled.value });
	},

	add: async ({ request, locals }) => {
		const typed = typedIn(await request.formData());
		const made = await attempt(async () => {
			const fields = fieldsOf(typed);
			await addSource(personOf(locals.principal), fields);
			return fields;
		});
		if (made.failed) return fail(made.status, { ...made.refused, typed });
		return { said: `The source ${made.value.slug} is in the library: name it in the upload.` };
	}
};
