import { describe, expect, it } from 'vitest';
import { withSecurityHeaders } from './security-headers.ts';

describe('withSecurityHeaders', () => {
	it.each([
		['x-content-type-options', 'nosniff'],
		['x-frame-options', 'DENY'],
		['referrer-policy', 'same-origin'],
		['cross-origin-opener-policy', 'same-origin'],
		['cross-origin-resource-policy', 'same-origin']
	])('sets %s', (name, value) => {
		expect(withSecurityHeaders(new Response('{}'), false).headers.get(name)).toBe(value);
	});

	it('keeps the policy of a page and gives everything else one that allows nothing', () => {
		const page = new Response('', { headers: { 'content-security-policy': "script-src 'nonce-1'" } });
		expect(withSecurityHeaders(page, false).headers.get('content-security-policy')).toBe(
			"script-src 'nonce-1'"
		);
		expect(withSecurityHeaders(new Response('{}'), false).headers.get('content-security-policy')).toContain(
			"default-src 'none'"
		);
	});

	it('asks for https only over https', () => {
		expect(withSecurityHeaders(new Response(), false).headers.has('strict-transport-security')).toBe(false);
		expect(withSecurityHeaders(new Response(), true).headers.get('strict-transport-security')).toMatch(
			/max-age=\d{8}/
		);
	});

	it('copes with the immutable headers of a redirect and keeps status, body and cookies', async () => {
		const redirect = withSecurityHeaders(Response.redirect('http://localhost/x', 303), false);
		expect([redirect.status, redirect.headers.get('location')]).toEqual([303, 'http://localhost/x']);
		const headers = new Headers([
			['set-cookie', 'a=1'],
			['set-cookie', 'b=2']
		]);
		const plain = withSecurityHeaders(new Response('text', { status: 201, headers }), false);
		expect(plain.headers.getSetCookie()).toEqual(['a=1', 'b=2']);
		expect(await plain.text()).toBe('text');
	});
});
