import * as citation from '$lib/server/library/citation.ts';
import * as materials from '$lib/server/library/materials.ts';
import * as versions from '$lib/server/library/versions.ts';
import { answered } from '../../answered.ts';
import { drawnAtOnce } from '../../sampled.ts';
import { decodeMaterialView } from './material-address.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ params, url }) => {
	const material = await answered(() => materials.get(params.slug));
	const published = material.datasets.flatMap(({ slug, latest }) =>
		latest === null ? [] : [{ slug, latest }]
	);
	const datasets = await answered(() =>
		Promise.all(
			published.map(async ({ slug, latest }) => {
				const { model: _model, ...version } = await versions.get(slug, latest);
				return {
					version,
					spectrum: await drawnAtOnce(version.ref),
					citation: {
						plain: citation.plain(version),
						bibtex: citation.bibtex(version),
						cslJson: JSON.stringify(citation.cslJson(version), null, 2)
					}
				};
			})
		)
	);
	const { view, problems } = decodeMaterialView(
		url.searchParams,
		datasets.map(({ version }) => ({ slug: version.dataset.slug, quality: version.quality }))
	);
	return { material, datasets, view, problems };
};
