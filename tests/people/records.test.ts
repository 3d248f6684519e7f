import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { curveSnippets } from '../../src/lib/components/studies/snippets.ts';
import { decodeStudy } from '../../src/lib/schemas/study-address.ts';
import { choiceRequest } from '../../src/lib/schemas/study-request.ts';
import type { Recomputation, SavedRecord } from '../../src/lib/schemas/record.ts';
import { startPeopleServer } from '../support/people-server.ts';
import { signedInAs, visitor, type Visitor } from '../support/visitor.ts';

/** Records over the wire: frozen by API or by form, recomputed after a restart, hidden from whom they are not for. */

let server: Awaited<ReturnType<typeof startPeopleServer>>;
let researcher: Visitor;

beforeAll(async () => {
	server = await startPeopleServer();
	researcher = await signedInAs(server.origin, 'researcher');
});
afterAll(() => server.stop());

const QUERY =
	'?left=gold-johnson-christy@1.0&medium=vacuum@1.0&right=silica-two-oscillators@1.0&choice=One&at=50';
const CANARY = `canary${Date.now().toString(36)}`;

async function post(person: Visitor, path: string, body: unknown, headers: Record<string, string> = {}) {
	return person.request(path, {
		method: 'POST',
		body: JSON.stringify(body),
		headers: { 'content-type': 'application/json', accept: 'application/json', ...headers }
	});
}

async function frozenBy(person: Visitor, visibility: string): Promise<SavedRecord> {
	const made = await post(person, '/api/v1/studies', { name: CANARY, query: QUERY, notes: CANARY });
	const { study } = (await made.json()) as { study: { id: string } };
	const answer = await post(person, `/api/v1/studies/${study.id}/freeze`, {
		revision: 1,
		authors: ['A. Researcher'],
		visibility
	});
	expect(answer.status).toBe(201);
	return ((await answer.json()) as { record: SavedRecord }).record;
}

describe('a record over the wire', () => {
	it('recomputes to identical bits after a restart of the server', async () => {
		const { checksum, content } = await frozenBy(researcher, 'everybody');
		await server.restart();
		const stranger = visitor(server.origin);
		const answer = await post(stranger, `/api/v1/records/${checksum}/recompute`, {});
		expect(answer.status).toBe(200);
		const { recomputation } = (await answer.json()) as { recomputation: Recomputation };
		expect(recomputation).toMatchObject({ identical: true, differing: 0 });
		expect(recomputation.compared).toBe(3 * content.choices[0].points.length);

		// By the page, without script.
		const page = await stranger.form(`/records/${checksum}?/recompute`, {});
		expect(await page.text()).toContain('Identical.');
	});

	it('is found by nobody whom it is not for, on any page, in any file, by any answer', async () => {
		const { checksum, content } = await frozenBy(researcher, 'private');
		const stranger = await signedInAs(server.origin, 'researcher-2');
		const signedOut = visitor(server.origin);
		const hidden = [
			`/records/${checksum}`,
			...[
				'archive.zip',
				'sheet.pdf',
				'sheet.svg',
				'curves.csv',
				'curves.json',
				'record.json',
				'citation.bib',
				'citation.ris'
			].map((file) => `/records/${checksum}/${file}`),
			`/api/v1/records/${checksum}`,
			`/api/v1/records/${checksum}/archive.zip`
		];
		for (const path of hidden) {
			expect((await researcher.get(path)).status, path).toBe(200);
			for (const other of [stranger, signedOut]) {
				const answer = await other.get(path);
				expect(answer.status, path).toBe(404);
				expect(await answer.text()).not.toContain(CANARY);
			}
		}
		expect((await post(stranger, `/api/v1/records/${checksum}/recompute`, {})).status).toBe(404);
		expect(
			(await post(stranger, `/api/v1/studies/${content.study.id}/freeze`, { revision: 1, authors: ['X'] }))
				.status
		).toBe(404);
		for (const list of [
			'/records',
			'/records?show=group',
			'/records?show=open',
			`/records?show=open&search=${CANARY}`,
			'/studies?show=shared'
		])
			for (const other of [stranger, signedOut])
				expect(await (await other.get(list)).text(), list).not.toContain(content.study.id);
	});

	it('refuses to freeze twice what was sent once, and says what is wrong with a form', async () => {
		const made = await post(researcher, '/api/v1/studies', { name: 'Once', query: QUERY });
		const { study } = (await made.json()) as { study: { id: string } };
		const fields = { revision: 1, authors: ['A'], visibility: 'private' };
		const key = { 'idempotency-key': `freeze-${CANARY}` };
		const [one, two] = [
			await post(researcher, `/api/v1/studies/${study.id}/freeze`, fields, key),
			await post(researcher, `/api/v1/studies/${study.id}/freeze`, fields, key)
		];
		expect([one.status, two.status]).toEqual([201, 201]);
		expect(await two.json()).toEqual(await one.json());
		const [{ total }] =
			await server.sql`select count(*)::int as total from record where study_id = ${study.id}`;
		expect(total).toBe(1);

		const refused = await researcher.form(`/studies/${study.id}/freeze`, {
			revision: '1',
			authors: ' \n ',
			visibility: 'private'
		});
		expect(refused.status).toBe(422);
		expect(await refused.text()).toContain('name at least one author');
	});
});

describe('files of a study in an address', () => {
	it('are computed for whoever may compute, and say what is wrong with an address', async () => {
		const stranger = visitor(server.origin);
		const answer = async (file: string, query = QUERY) => stranger.get(`/study/${file}${query}`);
		expect(
			(await (await answer('curves.csv')).text()).split('\r\n').find((line) => !line.startsWith('#'))
		).toMatch(/^separation,free_energy_A,free_energy_bound_A,pressure_A,/);
		const columns = (await (await answer('curves.json')).json()) as { columns: Record<string, number[]> };
		expect(columns.columns.separation).toContain(50);
		const pdf = Buffer.from(await (await answer('sheet.pdf')).arrayBuffer()).toString('latin1');
		expect(pdf.slice(0, 5)).toBe('%PDF-');
		expect(pdf.match(/\/Type \/Page\b/g)).toHaveLength(1);
		expect(await (await answer('citation.bib')).text()).toContain('@article{johnson-christy-1972,');
		expect(await (await answer('citation.ris')).text()).toMatch(/^TY {2}- DATA/);
		expect((await answer('sheet.pdf', '?left=nonsense')).status).toBe(422);
		expect((await answer('curves.csv', QUERY.replace('vacuum@1.0', 'vacuum@9.0'))).status).toBe(422);
		expect((await answer('sheet.docx')).status).toBe(404);
	});

	it('can be fetched with a token, as the page’s own lines do', async () => {
		const made = await post(researcher, '/api/v1/tokens', {
			name: 'snippet',
			scopes: ['read', 'compute'],
			days: 1
		});
		const { secret } = (await made.json()) as { secret: string };
		const { study } = decodeStudy(new URLSearchParams(QUERY));
		const [, shell] = curveSnippets(server.origin, choiceRequest(study, study.choices[0]));
		const [, body] = /--data '([\s\S]*)'\n$/.exec(shell.text) ?? [];
		const [, address] = /"(http[^"]+)"/.exec(shell.text) ?? [];
		const answer = await visitor(server.origin).request(address, {
			method: 'POST',
			body,
			headers: { 'content-type': 'application/json', authorization: `Bearer ${secret}` }
		});
		expect(answer.status).toBe(200);
		expect(((await answer.json()) as { points: unknown[] }).points.length).toBeGreaterThan(20);
	});
});
