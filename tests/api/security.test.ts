import { readdirSync, readFileSync } from 'node:fs';
import { request as httpRequest } from 'node:http';
import { dirname, join, relative } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { aRequest, post } from '../support/force-requests.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

let server: TestServer;
beforeAll(async () => {
	server = await startTestServer();
}, 180_000);
afterAll(() => server?.stop());

const JSON_TYPE = { 'content-type': 'application/json' };

/** `fetch` sets Origin, Cookie and the like itself; a hostile client does not ask it. */
function raw(
	path: string,
	method: string,
	headers: Record<string, string>,
	body = ''
): Promise<{ status: number; headers: Record<string, unknown>; text: string }> {
	return new Promise((resolve, reject) => {
		const length = { 'content-length': String(Buffer.byteLength(body)) };
		const options = { method, headers: { ...length, ...headers }, agent: false };
		const sent = httpRequest(`${server.origin}${path}`, options, (answer) => {
			let text = '';
			answer.setEncoding('utf8').on('data', (chunk) => (text += chunk));
			answer.on('end', () => resolve({ status: answer.statusCode ?? 0, headers: answer.headers, text }));
		});
		sent.on('error', reject);
		sent.end(body);
	});
}

describe('security headers', () => {
	it.each([
		['a page', '/library'],
		['a page that is not there', '/no/such/page'],
		['the API', '/api/v1/health'],
		['an error of the API', '/api/v1/nothing']
	])('are on %s', async (_what, path) => {
		const { headers } = await fetch(`${server.origin}${path}`);
		expect(Object.fromEntries(headers)).toMatchObject({
			'x-content-type-options': 'nosniff',
			'x-frame-options': 'DENY',
			'referrer-policy': 'same-origin',
			'cross-origin-opener-policy': 'same-origin',
			'cross-origin-resource-policy': 'same-origin',
			'permissions-policy': expect.stringContaining('camera=()')
		});
		const policy = headers.get('content-security-policy') ?? '';
		expect(policy).toContain("frame-ancestors 'none'");
		expect(policy).toContain("base-uri 'none'");
		expect(headers.has('strict-transport-security')).toBe(false);
	});

	it('allow a page its own scripts by nonce and no other', async () => {
		const answer = await fetch(`${server.origin}/library`);
		const policy = answer.headers.get('content-security-policy') ?? '';
		const scripts = policy.split(';').find((part) => part.trim().startsWith('script-src')) ?? '';
		const nonce = /'nonce-([^']+)'/.exec(scripts)?.[1];
		expect(nonce?.length).toBeGreaterThan(15);
		expect(scripts).not.toMatch(/unsafe|\*|https?:|data:/);
		const inline = (await answer.text()).match(/<script\b[^>]*>/g) ?? [];
		expect(inline.length).toBeGreaterThan(0);
		for (const tag of inline) expect(tag).toContain(`nonce="${nonce}"`);
		const again = await fetch(`${server.origin}/library`);
		expect(again.headers.get('content-security-policy')).not.toContain(nonce);
	});

	it('let an answer of the API do nothing', async () => {
		const { headers } = await fetch(`${server.origin}/api/v1/openapi.json`);
		expect(headers.get('content-security-policy')).toContain("default-src 'none'");
	});
});

describe('a request that another site caused', () => {
	const foreign: [what: string, headers: Record<string, string>][] = [
		['a foreign Origin', { origin: 'https://evil.example' }],
		['the null Origin', { origin: 'null' }],
		['a foreign Origin and a cookie', { origin: 'https://evil.example', cookie: 'session=x' }],
		['a cookie and no Origin', { cookie: 'session=x' }],
		['fetch metadata of another site', { 'sec-fetch-site': 'cross-site' }],
		['an Origin that begins alike', { origin: 'http://localhost:1' }],
		[
			'an upper-case form type',
			{ origin: 'https://evil.example', 'content-type': 'APPLICATION/X-WWW-FORM-URLENCODED' }
		],
		['plain text', { origin: 'https://evil.example', 'content-type': 'text/plain' }],
		['a method override', { origin: 'https://evil.example', 'x-http-method-override': 'GET' }]
	];

	it.each(foreign)('is refused by %s', async (_what, headers) => {
		for (const method of ['POST', 'PUT', 'PATCH', 'DELETE']) {
			const answer = await raw(
				'/api/v1/forces',
				method,
				{ ...JSON_TYPE, ...headers },
				JSON.stringify(aRequest())
			);
			expect(answer.status).toBe(403);
		}
	});

	it('is let through from the own page and from a program', async () => {
		const body = JSON.stringify(aRequest());
		const own = { ...JSON_TYPE, origin: server.origin, cookie: 'theme=dark' };
		expect((await raw('/api/v1/forces', 'POST', own, body)).status).toBe(200);
		expect((await raw('/api/v1/forces', 'POST', JSON_TYPE, body)).status).toBe(200);
	});

	it('gets no leave to read across sites', async () => {
		const answer = await raw('/api/v1/forces', 'OPTIONS', {
			origin: 'https://evil.example',
			'access-control-request-method': 'POST',
			'access-control-request-headers': 'content-type'
		});
		expect(Object.keys(answer.headers).filter((name) => name.startsWith('access-control'))).toEqual([]);
	});
});

describe('what is not meant to be', () => {
	it.each([
		['GET', '/api/v1/forces', 405],
		['DELETE', '/api/v1/forces', 405],
		['GET', '/api/v1/no-such-thing', 404],
		['POST', '/api/v1/no-such-thing', 404]
	])('%s %s answers %i in the shape of the API', async (method, path, status) => {
		const answer = await raw(path, method, { ...JSON_TYPE, accept: '*/*' });
		expect(answer.status).toBe(status);
		expect(JSON.parse(answer.text)).toEqual({
			error: { code: expect.any(String), message: expect.any(String) }
		});
	});

	it.each([
		['another type', { 'content-type': 'text/csv' }, JSON.stringify(aRequest()), 415, 'content-type'],
		['no JSON', {}, '{"arrangement":', 400, 'malformed'],
		['nothing', {}, '', 400, 'malformed'],
		['a body over the limit', {}, `{"x":"${'x'.repeat(5 * 2 ** 20)}"}`, 413, 'too-large']
	])('%s is refused', async (_what, headers, body, status, code) => {
		const answer = await raw('/api/v1/forces', 'POST', { ...JSON_TYPE, ...headers }, body);
		expect(answer.status).toBe(status);
		expect(JSON.parse(answer.text).error.code).toBe(code);
	});

	it('leaves prototypes alone', async () => {
		const body = JSON.stringify(aRequest()).replace('{', '{"__proto__":{"polluted":true},');
		expect((await post(server.origin, body)).status).toBe(422);
		expect((await post(server.origin, aRequest())).status).toBe(200);
	});

	it('shows nothing of an accident but its id', async () => {
		await server.sql`alter table rate_counter rename to rate_counter_away`;
		try {
			const answer = await post(server.origin, aRequest());
			const text = await answer.text();
			expect(answer.status).toBe(500);
			expect(JSON.parse(text).error).toEqual({
				code: 'internal',
				message: expect.any(String),
				id: expect.stringMatching(/^[0-9a-f-]{36}$/)
			});
			expect(text).not.toMatch(/rate_counter|insert|select|postgres|\.js/i);
		} finally {
			await server.sql`alter table rate_counter_away rename to rate_counter`;
		}
	});
});

describe('the description of the API', () => {
	it('names every route and method there is, and no other', async () => {
		const { paths, openapi } = await (await fetch(`${server.origin}/api/v1/openapi.json`)).json();
		expect(openapi).toBe('3.1.0');
		const described = Object.entries(paths as Record<string, object>).flatMap(([path, operations]) =>
			Object.keys(operations).map((method) => `${method.toUpperCase()} ${path}`)
		);
		expect(described.sort()).toEqual(routesOfTheApi().sort());
	});

	it('has every schema that it refers to', async () => {
		const text = await (await fetch(`${server.origin}/api/v1/openapi.json`)).text();
		const known = Object.keys(JSON.parse(text).components.schemas);
		const named = [...text.matchAll(/"#\/components\/schemas\/([^"]+)"/g)].map(([, name]) => name);
		expect(named.length).toBeGreaterThan(10);
		expect(named.filter((name) => !known.includes(name))).toEqual([]);
	});
});

function routesOfTheApi(): string[] {
	const base = 'src/routes/api/v1';
	return readdirSync(base, { recursive: true, withFileTypes: true })
		.filter((entry) => entry.isFile() && entry.name === '+server.ts')
		.flatMap((entry) => {
			const file = join(entry.parentPath, entry.name);
			const path = `/${relative(base, dirname(file))}`.replace(/\[(\w+)\]/g, '{$1}');
			const exported = readFileSync(file, 'utf8').matchAll(/export const (GET|POST|PUT|PATCH|DELETE)\b/g);
			return [...exported].map(([, method]) => `${method} ${path}`);
		});
}
