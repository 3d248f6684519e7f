import { fail } from '@sveltejs/kit';
import { materialClass, materialFields } from '$lib/schemas/material.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { addMaterial } from '$lib/server/library/additions.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = () => ({ classes: materialClass.options });

const NAMES = [
	'slug',
	'name',
	'formula',
	'class',
	'densityGPerCm3',
	'aliases',
	'casNumber',
	'staticPermittivity',
	'staticPermittivitySource',
	'refractiveIndexD',
	'notes'
] as const;

const numeric = (text: string) => (text.trim() === '' ? null : Number(text));
const textual = (text: string) => (text.trim() === '' ? null : text);

export const actions: Actions = {
	default: async ({ request, locals }) => {
		const form = await request.formData();
		const typed = Object.fromEntries(NAMES.map((name) => [name, field(form, name)]));
		const made = await attempt(async () => {
			const fields = parseForm(materialFields, {
				slug: typed.slug,
				name: typed.name,
				class: typed.class,
				formula: textual(typed.formula),
				densityGPerCm3: numeric(typed.densityGPerCm3),
				aliases: typed.aliases.split(/\s*[,;]\s*/).filter(Boolean),
				casNumber: textual(typed.casNumber),
				staticPermittivity: numeric(typed.staticPermittivity),
				staticPermittivitySource: textual(typed.staticPermittivitySource),
				refractiveIndexD: numeric(typed.refractiveIndexD),
				notes: textual(typed.notes)
			});
			await addMaterial(personOf(locals.principal), fields);
			return fields;
		});
		if (made.failed) return fail(made.status, { ...made.refused, typed });
		return { said: `${made.value.name} is in the library.`, slug: made.value.slug };
	}
};
