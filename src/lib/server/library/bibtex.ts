import { Cite } from '@citation-js/core';
import '@citation-js/plugin-bibtex';
import type { SourceKind } from '../../schemas/source.ts';
import { InvalidInput } from '../errors.ts';

/** One entry of BibTeX as the fields of a source, as texts of a form; what it does not say stays empty. */

export interface SourceTexts {
	slug: string;
	title: string;
	authors: string;
	year: string;
	kind: SourceKind;
	container: string;
	volume: string;
	pages: string;
	doi: string;
	url: string;
}

const BIBTEX_MAX = 20_000;

const KINDS: Record<string, SourceKind> = {
	'article-journal': 'article',
	article: 'article',
	'paper-conference': 'article',
	book: 'book',
	chapter: 'book',
	report: 'standard',
	dataset: 'measurement'
};

/** What the reader of BibTeX gives: CSL-JSON, of which these fields are of use. */
interface CslEntry {
	type?: string;
	title?: string;
	author?: { family?: string; given?: string; literal?: string }[];
	issued?: { 'date-parts'?: number[][] };
	'container-title'?: string;
	publisher?: string;
	volume?: string | number;
	page?: string;
	DOI?: string;
	URL?: string;
}

/** @throws InvalidInput where it is not one entry that can be read */
export function readBibtex(text: string): SourceTexts {
	const refuse = (message: string): never => {
		throw new InvalidInput('The BibTeX was not read.', [{ path: 'bibtex', message }]);
	};
	if (text.length > BIBTEX_MAX) refuse(`one entry, at most ${BIBTEX_MAX} characters`);
	// Nothing but BibTeX: the reader takes addresses too, and would fetch them.
	if (!/^\s*@\s*[a-z]+\s*[{(]/i.test(text)) refuse('an entry begins with its kind, as @article{');
	let entries: CslEntry[] = [];
	try {
		entries = new Cite(text, { forceType: '@bibtex/text' }).data as CslEntry[];
	} catch (error) {
		refuse(error instanceof Error ? error.message.split('\n')[0] : 'it cannot be read');
	}
	if (entries.length !== 1) refuse(`paste one entry; this has ${entries.length}`);
	return textsOf(entries[0]);
}

function textsOf(entry: CslEntry): SourceTexts {
	const authors = (entry.author ?? []).map(({ family, given, literal }) =>
		literal ? literal : [family, given].filter(Boolean).join(', ')
	);
	const year = String(entry.issued?.['date-parts']?.[0]?.[0] ?? '');
	const first = (entry.author ?? []).slice(0, 2).map(({ family, literal }) => family ?? literal ?? '');
	return {
		slug: slugOf([...first, year].join(' ')),
		title: entry.title ?? '',
		authors: authors.join('\n'),
		year,
		kind: KINDS[entry.type ?? ''] ?? 'article',
		container: entry['container-title'] ?? entry.publisher ?? '',
		volume: String(entry.volume ?? ''),
		pages: entry.page ?? '',
		doi: (entry.DOI ?? '').replace(/^https?:\/\/(dx\.)?doi\.org\//, ''),
		url: entry.URL ?? ''
	};
}

/** "Johnson Christy 1972" as johnson-christy-1972. */
const slugOf = (text: string): string =>
	text
		.normalize('NFD')
		.replace(/\p{M}/gu, '')
		.toLowerCase()
		.replace(/[^a-z0-9]+/g, '-')
		.replace(/^-|-$/g, '')
		.slice(0, 80);
