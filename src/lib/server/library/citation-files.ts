import type { Source, SourceFields } from '../../schemas/source.ts';
import type { VersionDetail } from '../../schemas/version.ts';
import { versionPath } from './citation.ts';

/** Citations in two more forms that programs read: RIS, and the metadata of DataCite 4. */

const RIS_KINDS: Record<SourceFields['kind'], string> = {
	article: 'JOUR',
	book: 'BOOK',
	measurement: 'DATA',
	standard: 'STAND',
	computation: 'DATA'
};

/** A field is one line; what was typed over several is one here. */
const line = (tag: string, value: string | null): string[] =>
	value === null || value === '' ? [] : [`${tag}  - ${value.replace(/\s+/g, ' ').trim()}`];

/** The version, then each of its sources. */
export function ris(version: VersionDetail, origin: string): string {
	const own = [
		'TY  - DATA',
		...line('TI', titleOf(version)),
		...line('AU', 'Hairsbreadth library'),
		...line('PY', (version.publishedAt ?? '').slice(0, 4)),
		...line('ET', version.number),
		...line('UR', `${origin}${versionPath(version)}`),
		...line('N1', `${version.ref}, ${version.checksum}`),
		'ER  - '
	];
	return [...own, ...version.sources.flatMap(risSource), ''].join('\r\n');
}

function risSource(source: Source): string[] {
	const [first, last] = (source.pages ?? '').split('-');
	return [
		`TY  - ${RIS_KINDS[source.kind]}`,
		...line('TI', source.title),
		...source.authors.flatMap((author) => line('AU', author)),
		...line('PY', String(source.year)),
		...line(source.kind === 'book' ? 'PB' : 'JO', source.container),
		...line('VL', source.volume),
		...line('SP', first ?? null),
		...line('EP', last ?? null),
		...line('DO', source.doi),
		...line('UR', source.url),
		'ER  - '
	];
}

const titleOf = ({ material, dataset, number }: VersionDetail): string =>
	`${material.name}: ${dataset.title}, version ${number}`;

/** DataCite Metadata Schema 4, in the JSON form of its interface. The identifier is the permanent address: no DOI is claimed. */
export function dataCite(version: VersionDetail, origin: string): Record<string, unknown> {
	const address = `${origin}${versionPath(version)}`;
	const licences = [...new Set(version.sources.flatMap(({ licence }) => (licence ? [licence] : [])))];
	return {
		schemaVersion: 'http://datacite.org/schema/kernel-4',
		identifiers: [{ identifier: address, identifierType: 'URL' }],
		alternateIdentifiers: [
			{ alternateIdentifier: version.ref, alternateIdentifierType: 'version' },
			{ alternateIdentifier: version.checksum, alternateIdentifierType: 'checksum of the model' }
		],
		creators: [{ name: 'Hairsbreadth library', nameType: 'Organizational' }],
		titles: [{ title: titleOf(version) }],
		publisher: { name: 'Hairsbreadth library' },
		publicationYear: (version.publishedAt ?? '').slice(0, 4),
		types: { resourceTypeGeneral: 'Dataset', resourceType: 'Permittivity' },
		version: version.number,
		dates: version.publishedAt ? [{ date: version.publishedAt.slice(0, 10), dateType: 'Issued' }] : [],
		formats: version.table ? ['text/csv', 'application/json'] : ['application/json'],
		...(version.note ? { descriptions: [{ description: version.note, descriptionType: 'Abstract' }] } : {}),
		rightsList: licences.map((licence) => ({
			rightsIdentifier: licence,
			rightsIdentifierScheme: 'SPDX',
			rightsUri: `https://spdx.org/licenses/${licence}`
		})),
		relatedIdentifiers: version.sources.flatMap(({ doi }) =>
			doi ? [{ relatedIdentifier: doi, relatedIdentifierType: 'DOI', relationType: 'IsDerivedFrom' }] : []
		)
	};
}
