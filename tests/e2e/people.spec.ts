import { expect, test, type Page } from '@playwright/test';
import { expectAccessible, watchTrouble } from '../support/browser.ts';

const ACCOUNT_PAGES = ['/account', '/account/sessions', '/account/tokens', '/account/data'];
const ADMINISTRATION_PAGES = [
	'/administration',
	'/administration/people',
	'/administration/groups',
	'/administration/invitations',
	'/administration/tokens',
	'/administration/settings',
	'/administration/outbox',
	'/administration/audit'
];

async function enter(page: Page, name: string): Promise<void> {
	await page.goto('/sign-in');
	await page.getByRole('button', { name: `Sign in as ${name}`, exact: true }).click();
	await expect(page.getByRole('navigation', { name: 'Account' }).getByRole('link', { name })).toBeVisible();
}

/** Presses Tab until the wished thing has the focus, as somebody without a mouse does. */
async function tabTo(page: Page, name: string | RegExp, role: 'button' | 'link' | 'textbox'): Promise<void> {
	const wished = page.getByRole(role, { name });
	for (let step = 0; step < 80; step += 1) {
		await page.keyboard.press('Tab');
		if (await wished.evaluate((element) => element === document.activeElement)) return;
	}
	throw new Error(`${name} cannot be reached by Tab.`);
}

test('signs in by a link from the mailbox, and out again', async ({ page }) => {
	const calm = watchTrouble(page);
	const mails = page.getByRole('link', { name: 'Your sign-in link for Hairsbreadth' });
	await page.goto('/demo/mail');
	const before = await mails.count();
	await page.goto('/sign-in');
	await page.waitForLoadState('networkidle');
	await page.getByLabel('E-mail address').fill('researcher@larkmoor.example');
	await page.getByRole('button', { name: 'Send a sign-in link' }).click();
	await expect(page.getByRole('status')).toContainText('a mail with a link is on its way');
	await expect(async () => {
		await page.goto('/demo/mail');
		expect(await mails.count()).toBe(before + 1);
	}).toPass({ timeout: 10_000 });
	await mails.first().click();
	await page.getByRole('link', { name: /sign-in\/confirm/ }).click();
	await page.getByRole('button', { name: 'Sign in' }).last().click();
	const corner = page.getByRole('navigation', { name: 'Account' });
	await expect(corner.getByRole('link', { name: 'Larkmoor researcher', exact: true })).toBeVisible();
	await corner.getByRole('button', { name: 'Sign out' }).click();
	await expect(corner.getByRole('link', { name: 'Sign in' })).toBeVisible();
	calm();
});

test('asks to sign in where that is needed, and goes on from there', async ({ page }) => {
	await page.goto('/account/tokens');
	await expect(page).toHaveURL(/\/sign-in\?to=%2Faccount%2Ftokens/);
	await page.getByRole('button', { name: 'Sign in as Larkmoor reader', exact: true }).click();
	await expect(page).toHaveURL(/\/account\/tokens$/);
});

test('makes a token, shows it once and revokes it', async ({ page, request }) => {
	await enter(page, 'Larkmoor researcher 2');
	await page.goto('/account/tokens');
	await page.waitForLoadState('networkidle');
	await page.getByLabel('What it is for').fill('Script of the week');
	await page.getByRole('button', { name: 'Make the token' }).click();
	const secret = await page.getByText(/^hb_[\w-]{43}$/).innerText();
	const headers = { authorization: `Bearer ${secret}` };
	expect((await request.get('/api/v1/tokens', { headers })).status()).toBe(200);
	await page.reload();
	await expect(page.getByText(secret)).toHaveCount(0);
	await page.getByRole('button', { name: 'Revoke the token Script of the week' }).first().click();
	await expect(page.getByRole('status').filter({ hasText: 'The token is revoked.' })).toBeVisible();
	expect((await request.get('/api/v1/tokens', { headers })).status()).toBe(401);
});

test('tells a reader that administration is not theirs', async ({ page }) => {
	await enter(page, 'Larkmoor reader');
	const answer = await page.goto('/administration');
	expect(answer?.status()).toBe(403);
	await expect(page.getByRole('heading', { name: 'This page is not yours to see' })).toBeVisible();
	await expect(page.getByRole('link', { name: 'Larkmoor reader', exact: true })).toBeVisible();
	await expect(page.getByText('Your role, or the scope of the token, does not allow this.')).toBeVisible();
	await expectAccessible(page);
});

test('invites somebody by keyboard alone, at the width of a phone', async ({ page }) => {
	await page.setViewportSize({ width: 390, height: 800 });
	await enter(page, 'Larkmoor administrator');
	await page.goto('/account');
	await tabTo(page, 'Administration', 'link');
	await page.keyboard.press('Enter');
	await expect(page.getByRole('heading', { name: 'How the installation is' })).toBeVisible();
	await tabTo(page, 'Invitations', 'link');
	await page.keyboard.press('Enter');
	await expect(page.getByRole('heading', { name: 'Invitations' })).toBeVisible();
	await page.waitForLoadState('networkidle');
	await tabTo(page, 'E-mail address', 'textbox');
	await page.keyboard.type('newcomer@larkmoor.example');
	await tabTo(page, 'Send the invitation', 'button');
	await page.keyboard.press('Enter');
	await expect(page.getByRole('status')).toContainText(
		'The invitation to newcomer@larkmoor.example is on its way'
	);
	await tabTo(page, /^Take back the invitation of newcomer@larkmoor.example/, 'button');
	await page.keyboard.press('Enter');
	await expect(page.getByRole('status')).toContainText('The invitation is taken back');
});

test('keeps what was typed when a form is refused', async ({ page }) => {
	await enter(page, 'Larkmoor administrator');
	await page.goto('/administration/groups');
	await page.waitForLoadState('networkidle');
	await page.getByLabel('Name', { exact: true }).fill('Vacuum bench');
	await page.getByLabel('Short name for addresses').fill('Vacuum Bench');
	await page.getByRole('button', { name: 'Make the group' }).click();
	await expect(page.getByText('use small letters, digits and single hyphens')).toBeVisible();
	await expect(page.getByLabel('Name', { exact: true })).toHaveValue('Vacuum bench');
});

for (const [width, scheme] of [
	[390, 'light'],
	[390, 'dark'],
	[1440, 'light']
] as const) {
	test(`has no fault in the accessibility of its pages at ${width} px, ${scheme}`, async ({ page }) => {
		test.setTimeout(90_000);
		await page.emulateMedia({ colorScheme: scheme });
		await page.setViewportSize({ width, height: 900 });
		for (const path of ['/sign-in', '/invitation?code=none', '/sign-in/confirm?link=none', '/demo/mail']) {
			await page.goto(path);
			await expectAccessible(page);
		}
		await enter(page, 'Larkmoor administrator');
		for (const path of [...ACCOUNT_PAGES, ...ADMINISTRATION_PAGES, '/account/groups/cantilevers']) {
			await page.goto(path);
			await expectAccessible(page);
			const wide = await page.evaluate(() => document.documentElement.scrollWidth > innerWidth);
			expect([path, wide]).toEqual([path, false]);
		}
	});
}
