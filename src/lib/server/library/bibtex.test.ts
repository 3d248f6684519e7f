import { describe, expect, it } from 'vitest';
import { InvalidInput } from '../errors.ts';
import { readBibtex } from './bibtex.ts';

const ENTRY = `@article{key,
	author = {Johnson, P. B. and Christy, R. W.},
	title = {Optical Constants of the Noble Metals},
	journal = {Physical Review B}, volume = 6, pages = {4370--4379}, year = 1972,
	doi = {10.1103/PhysRevB.6.4370}
}`;

describe('readBibtex', () => {
	it('fills the fields of a source', () => {
		expect(readBibtex(ENTRY)).toEqual({
			slug: 'johnson-christy-1972',
			title: 'Optical Constants of the Noble Metals',
			authors: 'Johnson, P. B.\nChristy, R. W.',
			year: '1972',
			kind: 'article',
			container: 'Physical Review B',
			volume: '6',
			pages: '4370-4379',
			doi: '10.1103/PhysRevB.6.4370',
			url: ''
		});
	});

	it('reads accents written for LaTeX', () => {
		const { authors, slug } = readBibtex(
			String.raw`@book{x, author={{\"O}stlund, A.}, title={Films}, year={1990}}`
		);
		expect(authors).toBe('Östlund, A.');
		expect(slug).toBe('ostlund-1990');
	});

	it.each([
		['an address, which would be fetched', 'https://example.org/x.bib'],
		['two entries', `${ENTRY}\n${ENTRY.replace('key', 'other')}`],
		['an entry left open', '@article{key, title = {Half'],
		['nothing', '']
	])('refuses %s', (_what, text) => {
		expect(() => readBibtex(text)).toThrow(InvalidInput);
	});
});
