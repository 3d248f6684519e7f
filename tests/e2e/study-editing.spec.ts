import { expect, test } from '@playwright/test';
import { computed, openStudy, valueOf, watchTrouble } from '../support/browser.ts';

/** Building an arrangement, and what becomes of wrong input. */

test('another material is found by search and the curve follows', async ({ page }) => {
	const noTrouble = watchTrouble(page);
	await openStudy(page);
	const before = await valueOf(page, 'A').textContent();

	await page.getByRole('button', { name: 'Change left body' }).click();
	const search = page.getByRole('combobox', { name: 'Material for the left body' });
	await expect(search).toBeFocused();
	await search.fill('silver');
	const option = page.getByRole('listbox').getByRole('option', { name: /^.*Silver.*Lorentz-Drude/ });
	await expect(option).toBeVisible();
	await search.press('ArrowDown');
	await search.press('ArrowUp');
	await option.click();

	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Silver against silica, in bromobenzene');
	await expect(page).toHaveURL(/left=silver-/);
	await computed(page);
	await expect(valueOf(page, 'A')).not.toHaveText(before ?? '');
	await expect(page.getByRole('button', { name: 'Change left body' })).toBeFocused();
	noTrouble();
});

test('a material is chosen by keyboard alone, and Escape keeps what was there', async ({ page }) => {
	await openStudy(page);
	await page.getByRole('button', { name: 'Change medium' }).press('Enter');
	const search = page.getByRole('combobox', { name: 'Material for the medium' });
	await search.press('Escape');
	await expect(search).toHaveCount(0);
	await expect(page).not.toHaveURL(/medium=/);

	await page.getByRole('button', { name: 'Change medium' }).press('Enter');
	await search.fill('vacuum');
	await expect(page.getByRole('listbox').getByRole('option')).toHaveCount(1);
	await search.press('Enter');
	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Gold against silica, across vacuum');
	await computed(page);
	await expect(valueOf(page, 'A')).toContainText('attraction');
});

test('a layer is added, retyped, taken back and brought again', async ({ page }) => {
	await openStudy(page);
	await page.getByRole('button', { name: 'Add a layer to the right body' }).click();
	const search = page.getByRole('combobox', { name: 'Material of the new layer on the right body' });
	await search.fill('gold');
	await page
		.getByRole('listbox')
		.getByRole('option', { name: /Gold.*Lorentz-Drude/ })
		.click();
	await expect(page.getByRole('heading', { level: 1 })).toHaveText(
		'Gold against gold on silica, in bromobenzene'
	);
	await computed(page);
	await expect(valueOf(page, 'A')).toContainText('attraction');

	const thickness = page.getByLabel('Thickness of Gold');
	await thickness.fill('0.02 µm');
	await thickness.press('Enter');
	await expect(thickness).toHaveValue('20 nm');
	await expect(page).toHaveURL(/right=gold-[a-z-]+@1\.0:20nm,silica/);

	await page.getByRole('button', { name: 'Undo' }).click();
	await page.getByRole('button', { name: 'Undo' }).click();
	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Gold against silica, in bromobenzene');
	await page.getByRole('button', { name: 'Redo' }).click();
	await expect(page.getByLabel('Thickness of Gold')).toHaveValue('10 nm');
	await page.getByRole('button', { name: 'Remove Gold' }).click();
	await expect(page.getByLabel('Thickness of Gold')).toHaveCount(0);
});

test('what is typed wrong stays, and the field says what would be right', async ({ page }) => {
	await openStudy(page);
	const temperature = page.getByLabel('Temperature');
	await temperature.fill('warm');
	await temperature.press('Enter');
	await expect(temperature).toHaveValue('warm');
	await expect(temperature).toHaveAttribute('aria-invalid', 'true');
	await expect(page.getByText('not understood; write it like 20 K')).toBeVisible();
	await temperature.fill('9000');
	await expect(page.getByText('between 0.5 K and 5000 K, or 0 K')).toBeVisible();
	await temperature.fill('0');
	await temperature.press('Enter');
	await expect(temperature).toHaveValue('0 K');
	await computed(page);
	await expect(page).toHaveURL(/T=0/);
});

test('what the engine refuses is said beside the field', async ({ page }) => {
	await openStudy(page);
	await page.route('**/api/v1/forces', (route) =>
		route.fulfill({
			status: 422,
			contentType: 'application/json',
			body: JSON.stringify({
				error: {
					code: 'refused',
					message: 'The engine cannot compute this request.',
					issues: [{ path: 'arrangement.temperatureK', message: 'is too high for this liquid' }]
				}
			})
		})
	);
	const temperature = page.getByLabel('Temperature');
	await temperature.fill('400');
	await temperature.press('Enter');
	await expect(page.getByText('is too high for this liquid')).toBeVisible();
	await expect(temperature).toHaveAttribute('aria-invalid', 'true');

	await page.unroute('**/api/v1/forces');
	await temperature.fill('310');
	await temperature.press('Enter');
	await computed(page);
	await expect(page.getByText('is too high for this liquid')).toHaveCount(0);
});

test('a server that cannot be reached costs nothing that was typed', async ({ page }) => {
	await openStudy(page);
	await page.route('**/api/v1/forces', (route) => route.abort());
	await page.getByLabel('Temperature').fill('310');
	await page.getByLabel('Temperature').press('Enter');
	await expect(page.getByText('The installation cannot be reached').first()).toBeVisible();
	await expect(page.getByLabel('Temperature')).toHaveValue('310 K');
});

test('a third choice takes the static term of gold as a plasma', async ({ page }) => {
	await openStudy(page);
	await page.getByRole('button', { name: 'Add a choice' }).click();
	await page.getByLabel('Name of choice C').fill('Plasma at n = 0');
	await page.getByLabel('Name of choice C').press('Enter');
	await page.locator('#choice-2-left-rule').selectOption('plasma');
	await expect(page.getByText('Gold: static term plasma')).toBeVisible();
	await computed(page);
	await expect(valueOf(page, 'C')).toBeVisible();
	await expect(page).toHaveURL(/choice=Plasma\+at\+n\+%3D\+0;/);
	await page.getByRole('button', { name: 'Remove choice C' }).click();
	await expect(valueOf(page, 'C')).toHaveCount(0);
});

test('a sphere has a force, and plates have none', async ({ page }) => {
	await openStudy(page);
	await expect(page.getByLabel('Quantity').getByRole('option', { name: 'Force' })).toHaveCount(0);
	await page.getByLabel('Shape').selectOption('sphere and plate');
	await page.getByLabel('Quantity').selectOption('Force');
	await computed(page);
	await expect(valueOf(page, 'A')).toContainText(/[pn]N/);
	await expect(valueOf(page, 'A')).toContainText('shape rule');
	await page.getByLabel('Shape').selectOption('plates');
	await expect(page.getByLabel('Quantity')).toHaveValue('pressure');
});

test('bodies swap, and the force stays', async ({ page }) => {
	await openStudy(page);
	const before = await valueOf(page, 'B').locator('.number').textContent();
	await page.getByRole('button', { name: 'Swap bodies' }).click();
	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Silica against gold, in bromobenzene');
	await computed(page);
	await expect(valueOf(page, 'B').locator('.number')).toHaveText(before ?? '');
});

test('a body is made uniaxial and covered with a sheet, and both travel in the address', async ({ page }) => {
	const noTrouble = watchTrouble(page);
	await openStudy(page);
	const before = await valueOf(page, 'A').textContent();

	await page.locator('summary', { hasText: 'of the right body' }).click();
	await page.getByRole('button', { name: 'Choose what lies along the normal of the right body' }).click();
	const search = page.getByRole('combobox', { name: 'Along the normal of the right body' });
	await search.fill('sapphire extraordinary');
	await page
		.getByRole('listbox')
		.getByRole('option', { name: /Sapphire/ })
		.first()
		.click();
	await expect(page).toHaveURL(/right=silica-[^&]*\*sapphire-/);
	const sheet = page.getByLabel('Sheet towards the gap');
	await sheet.fill('6.09e-5');
	await sheet.press('Enter');
	await expect(page).toHaveURL(/~0\.0000609|~6\.09e-5/);
	await computed(page);
	await expect(valueOf(page, 'A')).not.toHaveText(before ?? '');

	await page.reload();
	await computed(page);
	await expect(page.getByLabel('Sheet towards the gap')).toHaveValue(/6\.09e-5|0\.0000609/);
	await page.getByRole('button', { name: 'Remove the axis of the right body' }).click();
	await expect(page).not.toHaveURL(/sapphire/);
	noTrouble();
});
