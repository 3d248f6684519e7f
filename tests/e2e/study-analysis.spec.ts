import { expect, test } from '@playwright/test';
import { computed, expectAccessible, openStudy, valueOf, watchTrouble } from '../support/browser.ts';

/** What lies behind a number: figures, terms, frequencies; ions, roughness, uncertain data. */

const WORKED =
	'?left=gold-lorentz-drude@1.0&medium=bromobenzene-debye-uv@1.0&right=silica-two-oscillators@1.0&at=38';

test('more about a separation is one disclosure away', async ({ page }) => {
	const noTrouble = watchTrouble(page);
	await openStudy(page, WORKED);
	await page.getByText(/^More about/).click();
	const figures = page.getByRole('table', { name: 'Figures at the hairline' });
	await expect(figures.getByRole('row', { name: /limit at short separations.*zJ/ })).toBeVisible();
	await expect(figures.getByRole('row', { name: /Local exponent of free energy/ })).toBeVisible();
	await expect(page.getByRole('img', { name: /n = 0 carries/ })).toBeVisible();
	await expect(page.getByRole('img', { name: /Weight of photon energies/ })).toBeVisible();
	await expectAccessible(page);
	noTrouble();
});

test('an assumed uncertainty of the data is carried to the pressure', async ({ page }) => {
	await openStudy(page, `${WORKED}&uncertainty=0.05`);
	await expect(page.getByRole('textbox', { name: 'Every permittivity, relative' })).toHaveValue('5 %');
	await page.getByText(/^More about/).click();
	await expect(page.getByRole('row', { name: /Standard uncertainty of pressure.*±/ })).toBeVisible();
	const block = page.getByRole('region', { name: 'What this number rests on' });
	await expect(block.getByText(/^±.*% of the value$/)).toBeVisible();
	await expect(page.locator('[data-band="A"]')).toHaveAttribute('d', /Z$/);
	await expect(
		page.getByText('band: data uncertain by one standard deviation', { exact: false })
	).toBeVisible();
});

test('a uniaxial body has its terms and its uncertainty too', async ({ page }) => {
	const sapphire = 'sapphire-ordinary-two-oscillators@1.0*sapphire-extraordinary-two-oscillators@1.0';
	const medium = 'vacuum@1.0&right=silica-two-oscillators@1.0';
	await openStudy(page, `?left=${sapphire}&medium=${medium}&at=20&uncertainty=0.02`);
	await page.getByText(/^More about/).click();
	await expect(page.getByRole('img', { name: /n = 0 carries/ })).toBeVisible();
	await expect(page.getByRole('row', { name: /Standard uncertainty of pressure.*±/ })).toBeVisible();
});

test('salt screens, and roughness ends the curve where peaks come too near', async ({ page }) => {
	await openStudy(
		page,
		'?left=gold-lorentz-drude@1.0&medium=bromobenzene-debye-uv@1.0&right=gold-lorentz-drude@1.0&at=500'
	);
	const before = await valueOf(page, 'A').textContent();
	await page.getByLabel('Ions in the medium').selectOption('salt');
	await expect(page).toHaveURL(/salt=0.001,1/);
	await computed(page);
	await expect(valueOf(page, 'A')).not.toHaveText(before ?? '');
	await page.getByText('Roughness and uncertainty of data').click();
	await page.getByRole('textbox', { name: 'Left surface, rms' }).fill('2 nm');
	await expect(page).toHaveURL(/rough=2,0/);
	await expect(page.getByText('Computed from 18.0 nm upwards', { exact: false })).toBeVisible();
	await computed(page);
	await expectAccessible(page);
});
