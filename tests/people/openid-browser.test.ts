import type { Browser, Page } from '@playwright/test';
import { expect as expectPage } from '@playwright/test';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { freePort } from '../../src/launch/free-port.mjs';
import { openChromium } from '../support/chromium.ts';
import { CLIENT, openInstitution, type Institution } from '../support/openid.ts';
import { startPeopleServer } from '../support/people-server.ts';

/** The way through the institution as a browser takes it: its redirects, its cookies and our content security policy. */

let server: Awaited<ReturnType<typeof startPeopleServer>>;
let institution: Institution;
let browser: Browser;

beforeAll(async () => {
	const port = await freePort();
	server = await startPeopleServer({
		HAIRSBREADTH_OIDC_ISSUER: `http://127.0.0.1:${port}`,
		HAIRSBREADTH_OIDC_CLIENT_ID: CLIENT.id,
		HAIRSBREADTH_OIDC_CLIENT_SECRET: CLIENT.secret,
		HAIRSBREADTH_OIDC_NAME: 'Larkmoor Institute',
		HAIRSBREADTH_OIDC_SCOPES: 'openid email profile groups',
		HAIRSBREADTH_OIDC_ROLES: JSON.stringify({ 'gap-work': 'researcher' })
	});
	institution = await openInstitution(port, server.origin);
	browser = await openChromium();
}, 180_000);
afterAll(async () => {
	await browser.close();
	await institution.close();
	await server.stop();
});

/** A page of somebody new to the browser, and what its console complained of. */
async function freshPage(): Promise<{ page: Page; trouble: string[] }> {
	const context = await browser.newContext({ baseURL: server.origin });
	const page = await context.newPage();
	const trouble: string[] = [];
	page.on('console', (message) => message.type() === 'error' && trouble.push(message.text()));
	page.on('pageerror', (error) => trouble.push(error.message));
	return { page, trouble };
}

const corner = (page: Page) => page.getByRole('navigation', { name: 'Account' });

describe('through the institution, in Chromium', () => {
	it('somebody new is let in with the role of their group, and out again', async () => {
		institution.becomes({
			sub: 'browser-1',
			email: 'by-browser@larkmoor.example',
			email_verified: true,
			name: 'Larkmoor by browser',
			groups: ['gap-work']
		});
		const { page, trouble } = await freshPage();
		await page.goto('/account/tokens');
		await page.getByRole('button', { name: /Larkmoor Institute/ }).click();
		await expectPage(corner(page).getByRole('link', { name: 'Larkmoor by browser' })).toBeVisible();
		expect(new URL(page.url()).pathname).toBe('/account/tokens');
		const [row] = await server.sql`select role from person where email = 'by-browser@larkmoor.example'`;
		expect(row.role).toBe('researcher');
		await corner(page).getByRole('button', { name: 'Sign out' }).click();
		await expectPage(corner(page).getByRole('link', { name: 'Sign in' })).toBeVisible();
		expect(trouble).toEqual([]);
	}, 60_000);

	it('an account that is there already is joined only by a step of its own', async () => {
		institution.becomes({
			sub: 'browser-2',
			email: 'researcher@larkmoor.example',
			email_verified: true,
			name: 'Somebody at the institute',
			groups: ['gap-work']
		});
		const { page } = await freshPage();
		await page.goto('/sign-in');
		await page.getByRole('button', { name: /Larkmoor Institute/ }).click();
		await expectPage(page.getByText('An account with your address exists already.')).toBeVisible();
		await expectPage(corner(page).getByRole('link', { name: 'Sign in' })).toBeVisible();

		await page.getByRole('button', { name: 'Sign in as Larkmoor researcher', exact: true }).click();
		await expectPage(corner(page).getByRole('link', { name: 'Larkmoor researcher' })).toBeVisible();
		await page.goto('/account');
		await page.getByRole('button', { name: /Larkmoor Institute/ }).click();
		await expectPage(
			page.getByRole('button', { name: 'Unlink the account of Larkmoor Institute' })
		).toBeVisible();
		const [{ count }] = await server.sql`select count(*)::int from account_link where subject = 'browser-2'`;
		expect(count).toBe(1);

		await corner(page).getByRole('button', { name: 'Sign out' }).click();
		await page.goto('/sign-in');
		await page.getByRole('button', { name: /Larkmoor Institute/ }).click();
		await expectPage(corner(page).getByRole('link', { name: 'Larkmoor researcher' })).toBeVisible();
	}, 60_000);
});
