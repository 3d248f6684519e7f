import { fail, redirect } from '@sveltejs/kit';
import { recommendation, refusal } from '$lib/schemas/upload.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { recommend, withdraw } from '$lib/server/library/curation.ts';
import { viewerOf } from '$lib/server/library/viewer.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import * as citation from '$lib/server/library/citation.ts';
import * as materials from '$lib/server/library/materials.ts';
import * as versions from '$lib/server/library/versions.ts';
import { answered } from '../../../../answered.ts';
import { drawnAtOnce } from '../../../../sampled.ts';
import { datasetJsonLd, linkHeader, scriptJson } from './permanence.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ params, url, locals, setHeaders }) => {
	const version = await answered(() => versions.get(params.slug, params.number));
	const [material, spectrum] = await answered(() =>
		Promise.all([materials.get(version.material.slug), drawnAtOnce(version.ref)])
	);
	const dataset = material.datasets.find(({ slug }) => slug === params.slug);
	// The address stays and says why; the hook gives it the status of what is gone.
	if (version.withdrawn !== null) locals.gone = true;
	setHeaders({ link: linkHeader(version, dataset?.latest ?? null, url.origin) });
	return {
		version,
		siblings: dataset?.versions ?? [],
		latest: dataset?.latest ?? null,
		recommended: dataset?.recommended ?? null,
		isCurator: viewerOf(locals.principal)?.isCurator ?? false,
		spectrum,
		citation: {
			plain: citation.plain(version, url.origin),
			bibtex: citation.bibtex(version, url.origin),
			cslJson: JSON.stringify(citation.cslJson(version, url.origin), null, 2)
		},
		jsonLd: scriptJson(datasetJsonLd(version, url.origin))
	};
};

export const actions: Actions = {
	withdraw: async ({ request, params, locals }) => {
		const form = await request.formData();
		const reason = field(form, 'reason').trim();
		const done = await attempt(() =>
			withdraw(
				personOf(locals.principal),
				params.slug,
				params.number,
				parseForm(refusal, { checksum: field(form, 'checksum'), reason })
			)
		);
		if (done.failed) return fail(done.status, { ...done.refused, reason, asked: 'withdraw' });
		redirect(303, `/datasets/${params.slug}/versions/${params.number}`);
	},

	recommend: async ({ request, params, locals }) => {
		const reason = field(await request.formData(), 'reason').trim();
		const done = await attempt(() =>
			recommend(personOf(locals.principal), params.slug, params.number, parseForm(recommendation, { reason }))
		);
		return done.failed
			? fail(done.status, { ...done.refused, reason, asked: 'recommend' })
			: { said: 'This version is recommended now.' };
	}
};
