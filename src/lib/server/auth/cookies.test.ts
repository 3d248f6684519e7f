import { describe, expect, it, vi } from 'vitest';

const environment = {
	HAIRSBREADTH_SECRET: Buffer.alloc(32, 1).toString('base64'),
	HAIRSBREADTH_DEMO: '0'
};

async function cookiesAt(origin: string) {
	vi.resetModules();
	for (const [name, value] of Object.entries({ ...environment, ORIGIN: origin })) vi.stubEnv(name, value);
	return import('./cookies.ts');
}

describe('cookies', () => {
	it('carry the host prefix over https, with all that it asks for', async () => {
		const { cookieName, cookieOptions } = await cookiesAt('https://gaps.example.org');
		expect(cookieName('session')).toBe('__Host-hairsbreadth-session');
		expect(cookieOptions()).toEqual({ path: '/', httpOnly: true, sameSite: 'lax', secure: true });
	});

	it('do without where there is no https', async () => {
		const { cookieName, cookieOptions } = await cookiesAt('http://localhost:4173');
		expect(cookieName('session')).toBe('hairsbreadth-session');
		expect(cookieOptions().secure).toBe(false);
	});
});
