import type { Source, SourceFields } from '../../schemas/source.ts';
import type { VersionDetail } from '../../schemas/version.ts';

/** How a version is cited, and the papers behind it. */

const familyOf = (author: string): string => author.split(',')[0].trim();

/** For lists: "Ordal et al. 1985". */
export function shortCitation({ authors, year }: Pick<SourceFields, 'authors' | 'year'>): string {
	const [first, second] = authors.map(familyOf);
	if (authors.length > 2) return `${first} et al. ${year}`;
	return second ? `${first} and ${second} ${year}` : `${first} ${year}`;
}

/** "P. B. Johnson, R. W. Christy, Optical constants ..., Physical Review B 6, 4370-4379 (1972), doi:..." */
export function sourceText(source: SourceFields): string {
	const authors = source.authors.map((author) => author.split(',').reverse().join(' ').trim()).join(', ');
	const place = [source.container, source.volume].filter(Boolean).join(' ');
	const parts = [authors, source.title, place, source.pages].filter(Boolean).join(', ');
	return `${parts} (${source.year})${source.doi ? `, doi:${source.doi}` : ''}`;
}

type Cited = Pick<
	VersionDetail,
	'ref' | 'number' | 'dataset' | 'material' | 'publishedAt' | 'checksum' | 'sources'
>;

const yearOf = ({ publishedAt }: Cited): string => (publishedAt ?? '').slice(0, 4);

const titleOf = ({ material, dataset, number }: Cited): string =>
	`${material.name}: ${dataset.title}, version ${number}`;

export const versionPath = ({ dataset, number }: Cited): string =>
	`/datasets/${dataset.slug}/versions/${number}`;

/** One paragraph: the version with its checksum, then what it rests on. */
export function plain(version: Cited, origin = ''): string {
	const own = `${titleOf(version)}. Hairsbreadth library, ${version.ref} (${yearOf(version)}), ${origin}${versionPath(version)}, ${version.checksum}.`;
	return `${own} Data from: ${version.sources.map(sourceText).join('; ')}.`;
}

/** An entry for the version and one for each source. */
export function bibtex(version: Cited, origin = ''): string {
	const own = entry('misc', version.ref.replace('@', '-'), {
		title: `{${escaped(titleOf(version))}}`,
		author: '{Hairsbreadth library}',
		year: yearOf(version),
		version: version.number,
		howpublished: escaped(version.ref),
		url: `${origin}${versionPath(version)}`,
		note: escaped(version.checksum)
	});
	return [own, ...version.sources.map(sourceEntry)].join('\n');
}

const BIBTEX_KINDS: Record<SourceFields['kind'], string> = {
	article: 'article',
	book: 'book',
	measurement: 'misc',
	standard: 'techreport',
	computation: 'misc'
};

function sourceEntry(source: Source): string {
	const container =
		source.kind === 'article' ? 'journal' : source.kind === 'book' ? 'publisher' : 'howpublished';
	return entry(BIBTEX_KINDS[source.kind], source.slug, {
		title: `{${escaped(source.title)}}`,
		author: source.authors.map(escaped).join(' and '),
		year: String(source.year),
		[container]: source.container && escaped(source.container),
		volume: source.volume && escaped(source.volume),
		pages: source.pages && escaped(source.pages).replace(/(\d)-(\d)/, '$1--$2'),
		doi: source.doi,
		url: source.url
	});
}

function entry(kind: string, key: string, fields: Record<string, string | null>): string {
	const lines = Object.entries(fields)
		.filter(([, value]) => value)
		.map(([name, value]) => `  ${name} = {${value}}`);
	return `@${kind}{${key},\n${lines.join(',\n')}\n}\n`;
}

/** Characters that LaTeX would take for commands; letters with accents are left to its UTF-8 input. */
const escaped = (text: string): string =>
	text
		.replace(/[\\{}]/g, '')
		.replace(/[&%$#_]/g, '\\$&')
		.replace(/\^/g, '\\^{}');

export interface CslItem {
	id: string;
	type: string;
	title: string;
	author: ({ family: string; given: string } | { literal: string })[];
	issued: { 'date-parts': number[][] };
	'container-title'?: string;
	volume?: string;
	page?: string;
	DOI?: string;
	URL?: string;
	version?: string;
}

/** CSL-JSON: the version first, then its sources. */
export function cslJson(version: Cited, origin = ''): CslItem[] {
	const own: CslItem = {
		id: version.ref,
		type: 'dataset',
		title: titleOf(version),
		author: [{ literal: 'Hairsbreadth library' }],
		issued: { 'date-parts': [(version.publishedAt ?? '').slice(0, 10).split('-').map(Number)] },
		version: version.number,
		URL: `${origin}${versionPath(version)}`
	};
	return [own, ...version.sources.map(cslSource)];
}

function cslSource(source: Source): CslItem {
	return {
		id: source.slug,
		type: source.kind === 'book' ? 'book' : source.kind === 'article' ? 'article-journal' : 'document',
		title: source.title,
		author: source.authors.map((author) => {
			const [family, given] = author.split(',').map((part) => part.trim());
			return given ? { family, given } : { literal: author };
		}),
		issued: { 'date-parts': [[source.year]] },
		...(source.container ? { 'container-title': source.container } : {}),
		...(source.volume ? { volume: source.volume } : {}),
		...(source.pages ? { page: source.pages } : {}),
		...(source.doi ? { DOI: source.doi } : {}),
		...(source.url ? { URL: source.url } : {})
	};
}
