import { describe, expect, it } from 'vitest';
import { readAuthSettings } from './settings.ts';

const secret = Buffer.alloc(32, 1).toString('base64');
const production = {
	NODE_ENV: 'production',
	ORIGIN: 'https://gaps.example.org',
	HOST: '0.0.0.0',
	HAIRSBREADTH_SECRET: secret,
	HAIRSBREADTH_SMTP_URL: 'smtp://mail.example.org:587'
};
const openId = {
	HAIRSBREADTH_OIDC_ISSUER: 'https://login.example.org',
	HAIRSBREADTH_OIDC_CLIENT_ID: 'gaps',
	HAIRSBREADTH_OIDC_CLIENT_SECRET: 'secret',
	HAIRSBREADTH_OIDC_ROLES: '{"gap-data":"curator"}'
};

describe('readAuthSettings', () => {
	it('accepts a production that names everything', () => {
		const found = readAuthSettings({ ...production, ...openId });
		expect(found).toMatchObject({ secure: true, demo: false, origin: 'https://gaps.example.org' });
		expect(found.openId?.roles).toEqual({ 'gap-data': 'curator' });
	});

	it.each([
		['HAIRSBREADTH_SECRET', undefined, 'HAIRSBREADTH_SECRET is unset'],
		['HAIRSBREADTH_SECRET', Buffer.alloc(31).toString('base64'), 'fewer than 32 bytes'],
		['ORIGIN', undefined, 'ORIGIN is unset'],
		['HAIRSBREADTH_SMTP_URL', undefined, 'without mail nobody can sign in'],
		['HAIRSBREADTH_SMTP_URL', 'http://mail', 'smtp://'],
		['HAIRSBREADTH_DEMO', 'yes', 'HAIRSBREADTH_DEMO must be 0 or 1'],
		['HAIRSBREADTH_ADMINISTRATOR', 'nobody', 'HAIRSBREADTH_ADMINISTRATOR']
	])('refuses production with %s = %s', (name, value, sentence) => {
		expect(() => readAuthSettings({ ...production, [name]: value })).toThrow(sentence);
	});

	it.each([
		['HAIRSBREADTH_OIDC_CLIENT_SECRET', undefined, 'must be set too'],
		['HAIRSBREADTH_OIDC_ROLES', undefined, 'must be set too'],
		['HAIRSBREADTH_OIDC_ROLES', 'curator', 'must be JSON'],
		['HAIRSBREADTH_OIDC_ROLES', '{"a":"king"}', 'a role is one of'],
		['HAIRSBREADTH_OIDC_ISSUER', 'http://login.example.org', 'must be an https:// address']
	])('refuses a provider with %s = %s', (name, value, sentence) => {
		expect(() => readAuthSettings({ ...production, ...openId, [name]: value })).toThrow(sentence);
	});

	it('runs demo mode on the loopback address only, unless told so twice', () => {
		const demo = { ...production, HAIRSBREADTH_DEMO: '1', HAIRSBREADTH_SMTP_URL: undefined };
		expect(() => readAuthSettings(demo)).toThrow('127.0.0.1 only');
		expect(() => readAuthSettings({ ...demo, HOST: undefined })).toThrow('127.0.0.1 only');
		expect(readAuthSettings({ ...demo, HOST: '127.0.0.1' }).demo).toBe(true);
		const twice = { HAIRSBREADTH_DEMO_OPEN: 'anyone-may-sign-in-as-anyone' };
		expect(readAuthSettings({ ...demo, ...twice }).demo).toBe(true);
		expect(() => readAuthSettings({ ...demo, HAIRSBREADTH_DEMO_OPEN: '1' })).toThrow();
	});
});
