import type { Source } from '$lib/schemas/source.ts';
import type { VersionDetail } from '$lib/schemas/version.ts';

/** What tells machines that this address stays, and where its relatives are. */

type Identified = Pick<
	VersionDetail,
	| 'ref'
	| 'number'
	| 'dataset'
	| 'material'
	| 'parent'
	| 'successors'
	| 'publishedAt'
	| 'checksum'
	| 'note'
	| 'sources'
	| 'table'
>;

export const versionAddress = (origin: string, slug: string, number: string): string =>
	`${origin}/datasets/${slug}/versions/${number}`;

/** The Link header: RFC 5829 for the relatives, RFC 8574 for the address to cite. */
export function linkHeader(version: Identified, latest: string | null, origin: string): string {
	const own = (number: string) => versionAddress(origin, version.dataset.slug, number);
	const api = `${origin}/api/v1/datasets/${version.dataset.slug}/versions/${version.number}`;
	const links: [address: string, relation: string, type?: string][] = [[own(version.number), 'cite-as']];
	if (latest !== null) links.push([own(latest), 'latest-version']);
	if (version.parent !== null) links.push([own(version.parent), 'predecessor-version']);
	for (const successor of version.successors) links.push([own(successor), 'successor-version']);
	for (const { licence } of version.sources)
		if (licence !== null) links.push([`https://spdx.org/licenses/${licence}`, 'license']);
	links.push([api, 'alternate', 'application/json']);
	return links
		.map(
			([address, relation, type]) =>
				`<${address}>; rel="${relation}"${type === undefined ? '' : `; type="${type}"`}`
		)
		.join(', ');
}

function work(source: Source): Record<string, unknown> {
	return {
		'@type': source.kind === 'article' ? 'ScholarlyArticle' : 'CreativeWork',
		name: source.title,
		author: source.authors.map((name) => ({ '@type': 'Person', name })),
		datePublished: String(source.year),
		...(source.doi === null ? {} : { sameAs: `https://doi.org/${source.doi}` })
	};
}

/** schema.org words for a dataset, as search engines of data read them. */
export function datasetJsonLd(version: Identified, origin: string): Record<string, unknown> {
	const address = versionAddress(origin, version.dataset.slug, version.number);
	const files = [
		...(version.table === null ? [] : [['table.csv', 'text/csv']]),
		['model.json', 'application/json']
	];
	const licences = [
		...new Set(version.sources.flatMap(({ licence }) => (licence === null ? [] : [licence])))
	];
	return {
		'@context': 'https://schema.org',
		'@type': 'Dataset',
		'@id': address,
		url: address,
		name: `${version.material.name}: ${version.dataset.title}`,
		description:
			version.note ?? `Permittivity of ${version.material.name.toLowerCase()} as a function of frequency.`,
		version: version.number,
		identifier: [version.ref, version.checksum],
		...(version.publishedAt === null ? {} : { datePublished: version.publishedAt }),
		variableMeasured: 'relative permittivity',
		isBasedOn: version.sources.map(work),
		...(licences.length === 0
			? {}
			: { license: licences.map((licence) => `https://spdx.org/licenses/${licence}`) }),
		distribution: files.map(([file, encodingFormat]) => ({
			'@type': 'DataDownload',
			contentUrl: `${address}/${file}`,
			encodingFormat
		}))
	};
}

/** Safe inside a script element: no character that markup would read. */
export function scriptJson(value: unknown): string {
	return JSON.stringify(value).replace(
		/[<>&\u2028\u2029]/g,
		(character) => `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`
	);
}
