import { describe, expect, it } from 'vitest';
import type { Source } from '../../schemas/source.ts';
import { bibtex, cslJson, plain, shortCitation, sourceText } from './citation.ts';

const PAPER: Source = {
	slug: 'doe-1999',
	title: 'Optics of {braces} & 50 % of A_B #1',
	authors: ['Rakić, A. D.', 'Elazar, J. M.'],
	year: 1999,
	kind: 'article',
	container: 'Journal of Gaps',
	volume: '6',
	pages: '4370-4379',
	doi: '10.1000/abc_1',
	url: null,
	licence: null,
	note: null,
	citation: 'Rakić and Elazar 1999'
};

const VERSION = {
	ref: 'gold-drude@1.0',
	number: '1.0',
	dataset: { slug: 'gold-drude', title: 'Drude, infrared fit' },
	material: { slug: 'gold', name: 'Gold', formula: 'Au', class: 'metal' as const, hazards: null },
	publishedAt: '2026-03-01T12:00:00.000Z',
	checksum: `sha256:${'a'.repeat(64)}`,
	sources: [PAPER]
};

describe('shortCitation', () => {
	it.each([
		[['Decca, R. S.'], 'Decca 2007'],
		[['Johnson, P. B.', 'Christy, R. W.'], 'Johnson and Christy 2007'],
		[['A, B.', 'C, D.', 'E, F.'], 'A et al. 2007'],
		[['International body'], 'International body 2007']
	])('of %j is "%s"', (authors, text) => {
		expect(shortCitation({ authors, year: 2007 })).toBe(text);
	});
});

describe('citations of a version', () => {
	it('name the version, its address and checksum, then its sources', () => {
		const text = plain(VERSION, 'https://gaps.larkmoor.example');
		expect(text).toContain(
			'gold-drude@1.0 (2026), https://gaps.larkmoor.example/datasets/gold-drude/versions/1.0'
		);
		expect(text).toContain(VERSION.checksum);
		expect(text).toContain(sourceText(PAPER));
		expect(sourceText(PAPER)).toBe(
			'A. D. Rakić, J. M. Elazar, Optics of {braces} & 50 % of A_B #1, Journal of Gaps 6, 4370-4379 (1999), doi:10.1000/abc_1'
		);
	});

	it('keep BibTeX whole whatever the title holds', () => {
		const text = bibtex(VERSION);
		expect(text).toContain('@misc{gold-drude-1.0,');
		expect(text).toContain('title = {{Optics of braces \\& 50 \\% of A\\_B \\#1}}');
		expect(text).toContain('pages = {4370--4379}');
		expect(text).toContain('author = {Rakić, A. D. and Elazar, J. M.}');
		expect(text.match(/{/g)?.length).toBe(text.match(/}/g)?.length);
	});

	it('come as CSL-JSON with names split and dates in parts', () => {
		const [own, paper] = cslJson(VERSION);
		expect(own).toMatchObject({ type: 'dataset', version: '1.0', issued: { 'date-parts': [[2026, 3, 1]] } });
		expect(paper).toMatchObject({
			type: 'article-journal',
			author: [
				{ family: 'Rakić', given: 'A. D.' },
				{ family: 'Elazar', given: 'J. M.' }
			],
			DOI: '10.1000/abc_1'
		});
		expect(paper).not.toHaveProperty('URL');
	});
});
