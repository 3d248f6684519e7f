import { describe, expect, it } from 'vitest';
import { permittivityModel } from '../../src/lib/schemas/permittivity.ts';
import { GET as getMaterials } from '../../src/routes/api/v1/materials/+server.ts';
import { GET as getMaterial } from '../../src/routes/api/v1/materials/[slug]/+server.ts';
import { GET as getVersion } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/+server.ts';
import { GET as getCitation } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/citation.bib/+server.ts';
import { GET as getModel } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/model.json/+server.ts';
import { GET as getRaw } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/raw/+server.ts';
import { GET as getTable } from '../../src/routes/api/v1/datasets/[slug]/versions/[number]/table.csv/+server.ts';
import { useDatabase } from '../support/database.ts';

useDatabase();

type Handler = (event: never) => Response | Promise<Response>;

/** Calls a handler as the router would. */
async function ask(
	handler: Handler,
	path: string,
	params: Record<string, string> = {},
	headers: HeadersInit = {}
) {
	const url = new URL(path, 'http://localhost:4173');
	const locals = { principal: { kind: 'nobody' } };
	return handler({ request: new Request(url, { headers }), url, params, locals } as never);
}

const VERSION = { slug: 'gold-johnson-christy', number: '1.0' };
const HANDLERS: [string, Handler][] = [
	['version', getVersion],
	['model.json', getModel],
	['table.csv', getTable],
	['raw', getRaw],
	['citation.bib', getCitation]
];

describe('GET /api/v1/materials', () => {
	it('pages by the cursor it gave out', async () => {
		const first = await (await ask(getMaterials, '/api/v1/materials?limit=60')).json();
		expect(first.materials).toHaveLength(60);
		const second = await (await ask(getMaterials, `/api/v1/materials?limit=60&cursor=${first.next}`)).json();
		expect(second.next).toBeNull();
		const slugs = [...first.materials, ...second.materials].map(({ slug }: { slug: string }) => slug);
		expect(new Set(slugs).size).toBe(89);
	});

	it.each([
		['class', 'class=plasma'],
		['limit', 'limit=0'],
		['limit', 'limit=1000'],
		['coversEv', 'coversEv=-1'],
		['quality', 'quality=good'],
		['cursor', 'cursor=xyz']
	])('names the field %s of "%s"', async (field, query) => {
		const answer = await ask(getMaterials, `/api/v1/materials?${query}`);
		expect(answer.status).toBe(422);
		const { error } = await answer.json();
		expect(error.issues.map(({ path }: { path: string }) => path)).toEqual([field]);
	});

	it('has one material with its datasets', async () => {
		const { material } = await (
			await ask(getMaterial, '/api/v1/materials/bromobenzene', { slug: 'bromobenzene' })
		).json();
		expect(material.datasets).toHaveLength(3);
		expect(material.hazards.caution).toContain('safety data sheet');
		expect(material.datasets[0].links.latest).toMatch(/^\/api\/v1\/datasets\/bromobenzene-/);
	});
});

describe('GET /api/v1/datasets/{slug}/versions/{number}', () => {
	it('has what the contract names', async () => {
		const { version } = await (await ask(getVersion, '/', VERSION)).json();
		for (const field of [
			'state',
			'quality',
			'checksum',
			'fingerprint',
			'sources',
			'sample',
			'checks',
			'parent',
			'links'
		])
			expect(version, field).toHaveProperty(field);
		expect(version.publishedAt).toMatch(/^\d{4}-\d\d-\d\dT.*Z$/);
	});

	it('has the model as a request takes it', async () => {
		const model = await (await ask(getModel, '/', VERSION)).json();
		expect(permittivityModel.parse(model)).toEqual(model);
	});

	it('has rows under a units row, the raw bytes and a citation', async () => {
		const table = await ask(getTable, '/', VERSION);
		expect(table.headers.get('content-type')).toBe('text/csv; charset=utf-8');
		const lines = (await table.text()).split('\n').filter((line) => !line.startsWith('#'));
		expect(lines.slice(0, 3)).toEqual(['photon energy,n,k', 'eV,(none),(none)', '0.64,0.92,13.78']);
		const raw = await ask(getRaw, '/', VERSION);
		expect(raw.headers.get('content-disposition')).toBe('attachment; filename="gold-johnson-christy.csv"');
		expect(await raw.text()).toContain('0.64,0.92,13.78');
		const citation = await (await ask(getCitation, '/', VERSION)).text();
		expect(citation).toContain('@article{johnson-christy-1972');
		expect(citation).toContain('http://localhost:4173/datasets/gold-johnson-christy/versions/1.0');
	});

	it.each(HANDLERS)('answers 404 with a sentence for a %s that is not there', async (_name, handler) => {
		const answer = await ask(handler, '/', { slug: 'nothing', number: '1.0' });
		expect(answer.status).toBe(404);
		expect((await answer.json()).error).toMatchObject({
			code: 'not-found',
			message: expect.stringContaining('nothing')
		});
	});

	it.each(HANDLERS)('tells a caller that has the %s already so', async (_name, handler) => {
		const first = await ask(handler, '/', VERSION);
		const etag = first.headers.get('etag') ?? '';
		expect(etag).toMatch(/^"[\w-]+"$/);
		const again = await ask(handler, '/', VERSION, { 'if-none-match': `"other", W/${etag}` });
		expect(again.status).toBe(304);
		expect(await again.text()).toBe('');
		expect((await ask(handler, '/', VERSION, { 'if-none-match': '"other"' })).status).toBe(200);
	});
});
