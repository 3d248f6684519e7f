import { describe, expect, it } from 'vitest';
import { isForeign } from './same-origin.ts';

const OWN = 'https://gaps.example';

function foreign(method: string, headers: Record<string, string>, own = OWN): boolean {
	return isForeign(new Request('https://gaps.example/x', { method, headers }), own);
}

describe('isForeign', () => {
	it.each([
		['a page of its own', 'POST', { origin: OWN, cookie: 's=1' }],
		['its own page by fetch metadata', 'POST', { 'sec-fetch-site': 'same-origin', cookie: 's=1' }],
		['a program without cookies', 'POST', {}],
		['a program with a token and a stray cookie', 'POST', { authorization: 'Bearer x', cookie: 's=1' }],
		['reading from anywhere', 'GET', { origin: 'https://evil.example', cookie: 's=1' }]
	])('lets %s through', (_who, method, headers) => {
		expect(foreign(method, headers as Record<string, string>)).toBe(false);
	});

	it.each([
		['another site', { origin: 'https://evil.example' }],
		['another site without cookies', { origin: 'https://evil.example', 'content-type': 'text/plain' }],
		['the null origin', { origin: 'null', cookie: 's=1' }],
		['another scheme', { origin: 'http://gaps.example' }],
		['another port', { origin: 'https://gaps.example:8443' }],
		['a name that begins alike', { origin: 'https://gaps.example.evil.example' }],
		['a sibling site by fetch metadata', { 'sec-fetch-site': 'same-site' }],
		['another site that hides its origin', { 'sec-fetch-site': 'cross-site', cookie: 's=1' }],
		['cookies and no word of where from', { cookie: 's=1' }],
		['a foreign origin beside a token', { origin: 'https://evil.example', authorization: 'Bearer x' }]
	])('stops %s', (_who, headers) => {
		for (const method of ['POST', 'PUT', 'PATCH', 'DELETE']) {
			expect(foreign(method, headers as Record<string, string>)).toBe(true);
		}
	});

	it('takes the names of the loopback address for one server, port by port', () => {
		expect(foreign('POST', { origin: 'http://127.0.0.1:4173' }, 'http://localhost:4173')).toBe(false);
		expect(foreign('POST', { origin: 'http://127.0.0.1:4174' }, 'http://localhost:4173')).toBe(true);
		expect(foreign('POST', { origin: 'http://localhost:4173' }, 'https://gaps.example')).toBe(true);
	});
});
