import { expect, test, type Page } from '@playwright/test';
import { computed, expectAccessible, watchTrouble } from '../support/browser.ts';

/** A search stated, left, found again, ranked, and opened as a study. */

async function enter(page: Page, name: string): Promise<void> {
	await page.context().clearCookies();
	await page.goto('/sign-in');
	await page.getByRole('button', { name: `Sign in as ${name}`, exact: true }).click();
	await expect(
		page.getByRole('navigation', { name: 'Account' }).getByRole('link', { name, exact: true })
	).toBeVisible();
}

test('a researcher states a screening, leaves, comes back, and opens the best arrangement as a study', async ({
	page
}) => {
	test.setTimeout(90_000);
	const calm = watchTrouble(page, /422/);
	const name = `Push ${Date.now().toString(36)}`;
	await enter(page, 'Larkmoor researcher');
	await page.getByRole('navigation', { name: 'Main' }).getByRole('link', { name: 'Screening' }).click();
	await expectAccessible(page);
	await page.getByRole('link', { name: 'State a new one' }).click();
	await page.waitForLoadState('networkidle');
	await expectAccessible(page);

	await page
		.getByRole('group', { name: 'Media between' })
		.getByLabel('With these words')
		.fill('bromobenzene');

	// What cannot be read is named, and nothing typed is lost.
	await page.getByLabel('Name', { exact: true }).fill(name);
	await page.getByLabel('Separations', { exact: true }).fill('20, near');
	await page.getByRole('button', { name: 'Count it' }).click();
	await expect(page.getByText('Not accepted:')).toBeVisible();
	await expect(page.getByLabel('Separations', { exact: true })).toHaveValue('20, near');
	await page.getByLabel('Separations', { exact: true }).fill('20, 50, 100, 200');
	await page.getByRole('button', { name: 'Count it' }).click();
	await expect(page.getByText(/[\d,]+ arrangements \(\d+ bodies, \d+ media\)/)).toBeVisible();
	await page.getByRole('button', { name: 'Start it' }).click();
	await expect(page.getByRole('heading', { level: 1 })).toHaveText(name);

	// Away, and back from the list.
	await page.goto('/library');
	await page.goto('/screenings');
	await page.getByRole('link', { name }).click();
	await expect(page.getByText('finished', { exact: true })).toBeVisible({ timeout: 90_000 });
	await expect(page.getByText(/combinations of bodies and medium\s+qualify\./)).toBeVisible();
	const list = page.getByRole('region', { name: /^Ranked arrangements/ });
	await expect(list.getByRole('listitem').first()).toContainText('Pa');
	await expectAccessible(page);

	// A long list is drawn where it is looked at.
	expect(await list.getByRole('listitem').count()).toBeLessThan(60);
	await list.evaluate((element) => element.scrollTo(0, element.scrollHeight));
	await expect(list.getByRole('listitem').last()).toContainText('Pa');

	await list.evaluate((element) => element.scrollTo(0, 0));
	await list.getByRole('button', { name: /^Why/ }).first().click();
	await expect(page.getByText(/The medium lies between the two bodies on/)).toBeVisible();
	await page.getByLabel('Hairline at').selectOption({ label: '100 nm' });
	await expect(page.getByRole('heading', { name: /^Against .* at 100 nm$/ })).toBeVisible();
	await expectAccessible(page);
	const [download] = await Promise.all([
		page.waitForEvent('download'),
		page.getByRole('link', { name: 'CSV', exact: true }).click()
	]);
	expect(download.suggestedFilename()).toMatch(/^screening-.*-result\.csv$/);

	// The best one, as a study: it repels there.
	await list.getByRole('listitem').first().getByRole('link').click();
	await computed(page);
	await expect(page.locator('[data-reading]')).toContainText('repulsion');
	await expect(page.locator('[data-reading]')).toContainText('100 nm');

	// The same with today's versions: nothing has changed.
	await page.goBack();
	await page.getByRole('button', { name: 'Repeat with the versions of today' }).click();
	await expect(page.getByRole('heading', { level: 1 })).toHaveText(`${name} (again)`);
	await expect(page.getByText('finished', { exact: true })).toBeVisible({ timeout: 90_000 });
	await expect(page.getByText(/and no number\s+differs/)).toBeVisible();
	calm();

	await page.goto('/screenings');
	const address = await page.getByRole('link', { name, exact: true }).getAttribute('href');
	await enter(page, 'Larkmoor researcher 2');
	expect((await page.goto(address ?? ''))?.status()).toBe(404);
});

for (const width of [390, 1440]) {
	test(`the pages of screening fit ${width} px in the dark`, async ({ page }) => {
		await page.setViewportSize({ width, height: 900 });
		await page.emulateMedia({ colorScheme: 'dark' });
		await enter(page, 'Larkmoor lead');
		for (const path of ['/screenings', '/screenings/new', '/screenings?show=others']) {
			await page.goto(path);
			await expectAccessible(page);
			expect(
				await page.evaluate(() => document.documentElement.scrollWidth - innerWidth)
			).toBeLessThanOrEqual(0);
		}
	});
}
