import * as citation from '$lib/server/library/citation.ts';
import * as materials from '$lib/server/library/materials.ts';
import * as versions from '$lib/server/library/versions.ts';
import { answered } from '../../../../answered.ts';
import { drawnAtOnce } from '../../../../sampled.ts';
import { datasetJsonLd, linkHeader, scriptJson } from './permanence.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ params, url, setHeaders }) => {
	const version = await answered(() => versions.get(params.slug, params.number));
	const [material, spectrum] = await answered(() =>
		Promise.all([materials.get(version.material.slug), drawnAtOnce(version.ref)])
	);
	const dataset = material.datasets.find(({ slug }) => slug === params.slug);
	setHeaders({ link: linkHeader(version, dataset?.latest ?? null, url.origin) });
	return {
		version,
		siblings: dataset?.versions ?? [],
		latest: dataset?.latest ?? null,
		spectrum,
		citation: {
			plain: citation.plain(version, url.origin),
			bibtex: citation.bibtex(version, url.origin),
			cslJson: JSON.stringify(citation.cslJson(version, url.origin), null, 2)
		},
		jsonLd: scriptJson(datasetJsonLd(version, url.origin))
	};
};
