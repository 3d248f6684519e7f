import { expect, test } from '@playwright/test';
import { watchTrouble } from '../support/browser.ts';

const ADDRESS = '/datasets/gold-johnson-christy/versions/1.0';

test('a version stands at a permanent address with its checksum, model, checks and origin', async ({
	page
}) => {
	const calm = watchTrouble(page);
	await page.goto(ADDRESS);
	const block = page.getByRole('region', { name: 'Title block' });
	await expect(block).toContainText('gold-johnson-christy@1.0');
	await expect(block).toContainText(/sha256:[0-9a-f]{64}/);
	await expect(block).toContainText('published');
	await expect(block).toContainText(/49 rows of n, k over eV/);
	await expect(page.getByText(/Below the table: the absorption of a Drude metal/)).toBeVisible();
	await expect(page.getByText(/Johnson, P\. B\.; Christy, R\. W\./)).toBeVisible();
	await expect(page.getByText('Let stand because:').first()).toBeVisible();
	calm();
});

test('a closed form shows its figures unrounded', async ({ page }) => {
	await page.goto('/datasets/gold-lorentz-drude/versions/1.0');
	await expect(page.getByText('Lorentz oscillators')).toBeVisible();
	await expect(page.getByRole('cell', { name: '0.415', exact: true })).toBeVisible();
	await expect(page.getByRole('cell', { name: '13.32', exact: true })).toBeVisible();
});

test('machines find the address to cite, the newest version and the files', async ({ page, baseURL }) => {
	const response = await page.goto(ADDRESS);
	const link = response?.headers().link ?? '';
	expect(link).toContain(`<${baseURL}${ADDRESS}>; rel="cite-as"`);
	expect(link).toContain('rel="latest-version"');
	const described = await page.locator('script[type="application/ld+json"]').textContent();
	const data = JSON.parse(described ?? '');
	expect(data['@type']).toBe('Dataset');
	expect(data.identifier).toContain('gold-johnson-christy@1.0');
	expect(data.distribution.map((file: { contentUrl: string }) => file.contentUrl)).toContain(
		`${baseURL}${ADDRESS}/table.csv`
	);
});

test('every download arrives', async ({ page, request }) => {
	await page.goto(ADDRESS);
	const links = page.locator('a[download]');
	expect(await links.count()).toBe(6);
	for (const address of await links.evaluateAll((all) => all.map((one) => (one as HTMLAnchorElement).href))) {
		const file = await request.get(address);
		expect(file.status(), address).toBe(200);
		expect((await file.body()).length, address).toBeGreaterThan(50);
	}
});

test('the newest version is found under its dataset', async ({ page }) => {
	for (const address of ['/datasets/gold-drude/latest', '/datasets/gold-drude']) {
		await page.goto(address);
		await expect(page).toHaveURL(/\/datasets\/gold-drude\/versions\/\d+\.\d+$/);
	}
});

test('what is not there is said', async ({ page, request }) => {
	const missing = await page.goto('/datasets/gold-drude/versions/99.0');
	expect(missing?.status()).toBe(404);
	await expect(page.locator('main')).toContainText('99.0');
	expect((await request.get(`${ADDRESS}/table.xlsx`)).status()).toBe(404);
	expect((await request.get('/datasets/nothing-here/latest')).status()).toBe(404);
	expect((await request.get('/datasets/nothing-here/versions/1.0/spectrum.json')).status()).toBe(404);
});
