import { describe, expect, it } from 'vitest';
import type { VersionDetail } from '../../schemas/version.ts';
import { dataCite, ris } from './citation-files.ts';

const VERSION: VersionDetail = {
	ref: 'gold-johnson-christy@1.0',
	number: '1.0',
	state: 'published',
	quality: 'checked',
	qualityReason: null,
	kind: 'model',
	modelKind: 'drude',
	measuredRangeEv: null,
	validRangeEv: null,
	staticPermittivity: null,
	conducts: true,
	checksum: `sha256:${'a'.repeat(64)}`,
	fingerprint: `sha256:${'b'.repeat(64)}`,
	note: 'Two\nlines.',
	publishedAt: '2026-11-30T10:00:00.000Z',
	publishedBy: 'installation',
	supersededBy: null,
	sources: [
		{
			slug: 'johnson-christy-1972',
			title: 'Optical Constants of the Noble Metals',
			authors: ['Johnson, P. B.', 'Christy, R. W.'],
			year: 1972,
			kind: 'article',
			container: 'Physical Review B',
			volume: '6',
			pages: '4370-4379',
			doi: '10.1103/PhysRevB.6.4370',
			url: null,
			licence: 'CC-BY-4.0',
			note: null,
			citation: 'Johnson and Christy 1972'
		}
	],
	dataset: { slug: 'gold-johnson-christy', title: 'Johnson-Christy table' },
	material: { slug: 'gold', name: 'Gold', formula: 'Au', class: 'metal', hazards: null },
	model: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.03 },
	checks: [],
	sample: null,
	parent: null,
	successors: [],
	createdAt: '2026-11-30T10:00:00.000Z',
	withdrawn: null,
	table: null
};

describe('ris', () => {
	it('gives the version and each source as a record of whole lines', () => {
		const text = ris(VERSION, 'https://gaps.example');
		const records = text.split(/ER {2}- \r\n/).filter(Boolean);
		expect(records).toHaveLength(2);
		expect(records[0]).toContain('UR  - https://gaps.example/datasets/gold-johnson-christy/versions/1.0\r\n');
		expect(records[1].split('\r\n').slice(0, 8)).toEqual([
			'TY  - JOUR',
			'TI  - Optical Constants of the Noble Metals',
			'AU  - Johnson, P. B.',
			'AU  - Christy, R. W.',
			'PY  - 1972',
			'JO  - Physical Review B',
			'VL  - 6',
			'SP  - 4370'
		]);
		for (const one of text.split('\r\n').filter(Boolean)) expect(one).toMatch(/^[A-Z][A-Z0-9] {2}- /);
	});
});

describe('dataCite', () => {
	it('has what the schema makes mandatory, and claims no DOI of its own', () => {
		const data = dataCite(VERSION, 'https://gaps.example');
		for (const name of ['identifiers', 'creators', 'titles', 'publisher', 'publicationYear', 'types'])
			expect(data[name]).toBeTruthy();
		expect(data.publicationYear).toBe('2026');
		expect(JSON.stringify(data.identifiers)).not.toContain('DOI');
		expect(data.relatedIdentifiers).toEqual([
			{
				relatedIdentifier: '10.1103/PhysRevB.6.4370',
				relatedIdentifierType: 'DOI',
				relationType: 'IsDerivedFrom'
			}
		]);
		expect(data.rightsList).toMatchObject([{ rightsIdentifier: 'CC-BY-4.0' }]);
	});
});
