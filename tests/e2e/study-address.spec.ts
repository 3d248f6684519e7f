import { expect, test } from '@playwright/test';
import { computed, hairline, openStudy, valueOf, watchTrouble } from '../support/browser.ts';

/** A study lives in its address. */

const LINK =
	'?left=silica-two-oscillators@1.0:20nm,gold-drude@1.0!plasma&medium=vacuum@1.0&right=gold-lorentz-drude@1.0' +
	'&T=77&choice=One&choice=Two;right:!plasma&from=10&to=1000&show=energy&against=0&at=123.4&parked=50';

test('a link shows the same study to someone else, to the last digit', async ({ page, context }) => {
	const noTrouble = watchTrouble(page);
	await openStudy(page, LINK);
	await expect(page.getByRole('heading', { level: 1 })).toHaveText(
		'Silica on gold against gold, across vacuum'
	);
	await expect(page.getByLabel('Temperature')).toHaveValue('77 K');
	await expect(page.getByLabel('Quantity')).toHaveValue('energy');
	await expect(hairline(page)).toHaveAttribute('aria-valuenow', '123.4');

	const other = await context.newPage();
	await openStudy(other, new URL(page.url()).search);
	for (const choice of ['A', 'B']) {
		await expect(valueOf(other, choice)).toHaveText((await valueOf(page, choice).textContent()) ?? '');
	}
	noTrouble();
});

test('the browser goes back to the study before', async ({ page }) => {
	await openStudy(page);
	await page.getByRole('button', { name: 'Swap bodies' }).click();
	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Silica against gold, in bromobenzene');
	// The page shows the swap before the address has it; only an address that moved can be gone back from.
	await expect(page).toHaveURL(/left=silica/);
	await page.goBack();
	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Gold against silica, in bromobenzene');
	await computed(page);
});

test('a damaged address says what was not read, and works with the rest', async ({ page }) => {
	await openStudy(page, '?left=Golld&T=hot&at=120&medium=vacuum@1.0');
	const said = page.getByRole('alert');
	await expect(said).toContainText('"Golld" is not the name of a version');
	await expect(said).toContainText('"hot" is not a number of K');
	await expect(hairline(page)).toHaveAttribute('aria-valuenow', '120');
	await expect(valueOf(page, 'A')).toContainText('attraction');
});

test('a version that the library does not have is named, beside its place and above the page', async ({
	page
}) => {
	await page.goto('/?left=unobtainium-drude@9.9');
	await expect(page.getByRole('alert')).toContainText('unobtainium-drude@9.9');
	await expect(page.getByText('This version is not in the library.')).toBeVisible();
	await expect(page.getByText(/no value here yet/)).toBeVisible();
});

test('without script the arrangement, its choices and its origin can still be read', async ({ browser }) => {
	const context = await browser.newContext({ javaScriptEnabled: false });
	const page = await context.newPage();
	await page.goto('/');
	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Gold against silica, in bromobenzene');
	await expect(page.getByText('Bromobenzene: Seven oscillators, version 1.0')).toBeVisible();
	await expect(page.locator('noscript p')).toContainText('Curves are computed by script in this page');
	await context.close();
});
