import { expect, test } from '@playwright/test';
import { expectAccessible, watchTrouble } from '../support/browser.ts';

const PAGES = {
	library: '/library',
	'empty library': '/library?search=unobtainium',
	material: '/materials/gold?first=gold-drude&second=gold-lorentz-drude',
	liquid: '/materials/bromobenzene',
	version: '/datasets/gold-johnson-christy/versions/1.0'
};

for (const [name, address] of Object.entries(PAGES)) {
	for (const width of [390, 768, 1440]) {
		for (const colorScheme of ['light', 'dark'] as const) {
			test(`${name} at ${width} px, ${colorScheme}: accessible, nothing beyond the edge`, async ({
				page
			}) => {
				const calm = watchTrouble(page);
				await page.setViewportSize({ width, height: 900 });
				await page.emulateMedia({ colorScheme, reducedMotion: 'reduce' });
				await page.goto(address);
				await page.waitForLoadState('networkidle');
				const beyond = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
				expect(beyond).toBeLessThanOrEqual(0);
				await expectAccessible(page);
				calm();
			});
		}
	}
}

test('the real-axis plot and its table are accessible too', async ({ page }) => {
	await page.goto('/materials/silicon');
	const part = page.getByRole('region', { name: 'On the real axis' });
	await part.scrollIntoViewIfNeeded();
	await expect(part.locator('.scatterlayer .trace').first()).toBeVisible({ timeout: 15_000 });
	await part.getByRole('button', { name: /Numbers as a table/ }).click();
	await expect(part.getByRole('table').first()).toBeVisible();
	await expectAccessible(page);
});

test('on paper the controls are gone and every dataset is unfolded', async ({ page }) => {
	await page.goto('/materials/bromobenzene');
	await page.waitForLoadState('networkidle');
	await page.emulateMedia({ media: 'print' });
	await expect(page.getByRole('group', { name: 'Datasets' })).toBeHidden();
	await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
	await expect(page.getByText(/Check the supplier/)).toBeVisible();
	const background = await page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor);
	expect(background).toBe('rgb(255, 255, 255)');
});
