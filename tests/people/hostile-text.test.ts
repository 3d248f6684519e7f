import type { Browser, Page } from '@playwright/test';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openChromium } from '../support/chromium.ts';
import { startPeopleServer } from '../support/people-server.ts';

/** What people may type anywhere comes out as the text that it is, on every page that shows it. */

const CORPUS = [
	'<script>hostile()</script>',
	'"><img src=x onerror=hostile()>',
	`'-hostile()-'`,
	'<svg/onload=hostile()>',
	'</title><script>hostile()</script>',
	'{{constructor.constructor("hostile()")()}}',
	'${hostile()}',
	'<a href="javascript:hostile()">x</a>',
	'&lt;img src=x onerror=hostile()&gt;',
	'\u202e<iframe srcdoc="<script>parent.hostile()</script>">'
];

let server: Awaited<ReturnType<typeof startPeopleServer>>;
let browser: Browser;
let page: Page;
/** Calls of what the texts try to call, and what the content security policy had to stop. */
const reached: string[] = [];

beforeAll(async () => {
	server = await startPeopleServer();
	browser = await openChromium();
	const context = await browser.newContext({
		baseURL: server.origin,
		// The header that the server is told to take the client's address from.
		extraHTTPHeaders: { 'x-test-client': '192.0.2.77' }
	});
	page = await context.newPage();
	await page.exposeFunction('hostile', () => reached.push(`called at ${page.url()}`));
	page.on('dialog', (dialog) => {
		reached.push(`dialog at ${page.url()}`);
		void dialog.dismiss();
	});
	page.on('console', (message) => {
		if (/Content Security Policy/.test(message.text())) reached.push(`${message.text()} at ${page.url()}`);
	});
}, 180_000);
afterAll(async () => {
	await browser.close();
	await server.stop();
});

async function become(account: string): Promise<void> {
	await page.context().clearCookies();
	await page.goto('/sign-in');
	await page.getByRole('button', { name: `Sign in as ${account}`, exact: true }).click();
	await page
		.getByRole('link', { name: 'Administration' })
		.or(page.getByText(account).first())
		.first()
		.waitFor();
}

/** Sends JSON as a page of the application does. */
async function post(path: string, body: unknown): Promise<number> {
	return page.evaluate(
		async ([to, content]) => {
			const headers = { 'content-type': 'application/json' };
			return (await fetch(to, { method: 'POST', headers, body: content })).status;
		},
		[path, JSON.stringify(body)] as const
	);
}

/** The page at an address shows each text as typed, and ran none of them. */
async function expectInert(path: string, texts: readonly string[]): Promise<void> {
	await page.goto(path, { waitUntil: 'load' });
	const shown = await page.evaluate(() => {
		const fields = [...document.querySelectorAll('input, textarea, option')] as HTMLInputElement[];
		return [document.body.textContent, ...fields.map(({ value }) => value)].join('\n');
	});
	expect(texts.filter((text) => !shown.includes(text)).map((text) => `${text} at ${path}`)).toEqual([]);
	expect(reached).toEqual([]);
}

describe('hostile text', () => {
	it('in names of groups, tokens and people stays text', async () => {
		await become('Larkmoor administrator');
		for (const [index, name] of CORPUS.entries()) {
			await server.sql.begin(async (sql) => {
				const [row] =
					await sql`insert into "group" (slug, name) values (${`hostile-${index}`}, ${name}) returning id`;
				await sql`insert into audit_entry (actor, action, object_type, object_id, details)
					values (${name}, 'group.create', 'group', ${row.id}, ${sql.json({ name })})`;
				const [person] = await sql`insert into person (email, name, role)
					values (${`hostile-${index}@larkmoor.example`}, ${name}, 'reader') returning id`;
				await sql`insert into audit_entry (actor, action, object_type, object_id, details)
					values ('installation', 'person.create', 'person', ${person.id}, '{}')`;
			});
			expect(await post('/api/v1/tokens', { name, scopes: ['read'], days: 7 })).toBe(201);
		}
		await expectInert('/administration/groups', CORPUS);
		await expectInert('/administration/people', CORPUS);
		await expectInert('/administration/tokens', CORPUS);
		await expectInert('/administration/audit', CORPUS);
		await expectInert('/account/tokens', CORPUS);
	}, 120_000);

	it('in what curators write stays text', async () => {
		await become('Larkmoor curator');
		for (const [index, text] of CORPUS.entries()) {
			const slug = `hostile-${index}`;
			expect(
				await post('/api/v1/materials', { slug, name: text, class: 'liquid', notes: text, aliases: [text] })
			).toBe(201);
			expect(
				await post('/api/v1/sources', { slug, title: text, authors: [text], year: 2020, kind: 'article' })
			).toBe(201);
			expect(await post('/api/v1/datasets', { slug, title: text, material: slug })).toBe(201);
			await expectInert(`/materials/${slug}`, [text]);
		}
		await expectInert('/library?withoutData=1&search=hostile', []);
	}, 120_000);

	it('in studies, records and screenings stays text', async () => {
		await become('Larkmoor researcher');
		const made = await page.evaluate(async (texts) => {
			const send = async (to: string, body: unknown) => {
				const headers = { 'content-type': 'application/json' };
				return (await fetch(to, { method: 'POST', headers, body: JSON.stringify(body) })).json();
			};
			const query = (name: string) =>
				`?left=gold-drude@1.0&medium=vacuum@1.0&right=gold-drude@1.0&at=50&choice=${encodeURIComponent(name.slice(0, 40).replace(/[%;]/g, ' '))}`;
			const found = [];
			for (const text of texts) {
				const { study } = await send('/api/v1/studies', {
					...{ name: text, notes: text, reasons: [text] },
					query: query(text)
				});
				const { record } = await send(`/api/v1/studies/${study.id}/freeze`, { revision: 1, authors: [text] });
				const { screening } = await send('/api/v1/screenings', {
					name: text,
					statement: {
						left: { versions: ['gold-drude@1.0'] },
						medium: { versions: ['vacuum@1.0'] },
						separationsNm: [50],
						criterion: { kind: 'repulsive' }
					}
				});
				found.push({ text, study: study.id, record: record.checksum, screening: screening.id });
			}
			return found;
		}, CORPUS);
		for (const { text, study, record, screening } of made) {
			await expectInert(`/studies/${study}`, [text]);
			await expectInert(`/studies/${study}/freeze`, [text]);
			await expectInert(`/records/${record}`, [text]);
			// Opened by itself, the picture is a document of its own.
			await page.goto(`/records/${record}/sheet.svg`);
			expect(reached).toEqual([]);
			await expectInert(`/screenings/${screening}`, [text]);
		}
		for (const list of ['/studies', '/records', '/screenings']) await expectInert(list, CORPUS);
	}, 180_000);

	it('in an address stays text', async () => {
		for (const text of CORPUS) {
			const coded = encodeURIComponent(text);
			await expectInert(`/?choice=${coded}&choice=B&left=${coded}&T=${coded}`, []);
			await expectInert(`/library?search=${coded}`, [text]);
			await expectInert(`/sign-in?to=${coded}`, []);
		}
	}, 180_000);
});
