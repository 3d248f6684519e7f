import { describe, expect, it } from 'vitest';
import { datasetJsonLd, linkHeader, scriptJson } from './permanence.ts';

const version = {
	ref: 'gold-drude@1.1',
	number: '1.1',
	dataset: { slug: 'gold-drude', title: 'Drude set' },
	material: { slug: 'gold', name: 'Gold', formula: 'Au', class: 'metal' as const, hazards: null },
	parent: '1.0',
	successors: ['2.0'],
	publishedAt: '2026-12-01T00:00:00.000Z',
	checksum: 'sha256:abc',
	note: null,
	table: null,
	sources: [
		{
			slug: 'ordal-1985',
			title: 'A title',
			authors: ['Ordal, M. A.'],
			year: 1985,
			kind: 'article' as const,
			container: null,
			volume: null,
			pages: null,
			doi: '10.1364/AO.24.004493',
			url: null,
			licence: 'CC-BY-4.0',
			note: null,
			citation: 'Ordal et al. 1985'
		}
	]
};
const origin = 'https://larkmoor.example';

describe('linkHeader', () => {
	it('names the address to cite, the newest version, and the relatives', () => {
		const links = linkHeader(version, '2.0', origin).split(', ');
		expect(links).toEqual([
			'<https://larkmoor.example/datasets/gold-drude/versions/1.1>; rel="cite-as"',
			'<https://larkmoor.example/datasets/gold-drude/versions/2.0>; rel="latest-version"',
			'<https://larkmoor.example/datasets/gold-drude/versions/1.0>; rel="predecessor-version"',
			'<https://larkmoor.example/datasets/gold-drude/versions/2.0>; rel="successor-version"',
			'<https://spdx.org/licenses/CC-BY-4.0>; rel="license"',
			'<https://larkmoor.example/api/v1/datasets/gold-drude/versions/1.1>; rel="alternate"; type="application/json"'
		]);
	});

	it('leaves out relatives that there are none of', () => {
		const header = linkHeader({ ...version, parent: null, successors: [] }, null, origin);
		expect(header).not.toMatch(/predecessor|successor|latest/);
		expect(header).toContain('cite-as');
	});
});

describe('datasetJsonLd', () => {
	it('offers a table only where there is one', () => {
		const table = { abscissaUnit: 'eV', quantities: ['n', 'k'], rowCount: 49, raw: null };
		const files = (data: Record<string, unknown>) => JSON.stringify(data.distribution);
		expect(files(datasetJsonLd(version, origin))).not.toContain('table.csv');
		expect(files(datasetJsonLd({ ...version, table }, origin))).toContain('versions/1.1/table.csv');
	});

	it('names version, checksum, source and licence', () => {
		const text = JSON.stringify(datasetJsonLd(version, origin));
		for (const word of ['gold-drude@1.1', 'sha256:abc', '10.1364/AO.24.004493', 'licenses/CC-BY-4.0']) {
			expect(text).toContain(word);
		}
	});
});

describe('scriptJson', () => {
	it('cannot end its script element and reads back the same', () => {
		const value = { note: '</script><b>&\u2028' };
		expect(scriptJson(value)).not.toMatch(/[<>&\u2028]/);
		expect(JSON.parse(scriptJson(value))).toEqual(value);
	});
});
