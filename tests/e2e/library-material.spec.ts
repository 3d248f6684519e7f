import { readFile } from 'node:fs/promises';
import { expect, test, type Page } from '@playwright/test';
import { watchTrouble } from '../support/browser.ts';

const line = (page: Page) => page.getByRole('slider', { name: 'Frequency line' });

async function openMaterial(page: Page, address: string): Promise<void> {
	await page.goto(`/materials/${address}`);
	await page.waitForLoadState('networkidle');
}

test('shows rival data over each other, with values under the line', async ({ page }) => {
	const calm = watchTrouble(page);
	await openMaterial(page, 'bromobenzene?at=38');
	await expect(page.getByRole('heading', { level: 1 })).toContainText('Bromobenzene');
	await expect(line(page)).toHaveAttribute('aria-valuetext', /38\.0 nm; .*eV.*Seven oscillators: \d\.\d+/);
	await line(page).focus();
	const before = Number(await line(page).getAttribute('aria-valuenow'));
	await page.keyboard.press('Shift+ArrowRight');
	await expect
		.poll(async () => Number(await line(page).getAttribute('aria-valuenow')) / before)
		.toBeCloseTo(10 ** (1 / 3), 6);
	await expect(page).toHaveURL(/at=17\.6/);
	calm();
});

test('names the hazards of a liquid with the caution', async ({ page }) => {
	await openMaterial(page, 'bromobenzene');
	const note = page.getByRole('region', { name: /Hazards of bromobenzene/ });
	await expect(note).toContainText('H226');
	await expect(note).toContainText('H411');
	await expect(note).toContainText(/safety data sheet/);
});

test('compares two datasets in per cent and keeps that in the address', async ({ page }) => {
	await openMaterial(page, 'gold');
	await page.getByLabel('First dataset').selectOption({ label: 'B Drude, infrared fit' });
	await expect(page.getByText('in per cent')).toHaveCount(0);
	await page.getByLabel('Second dataset').selectOption({ label: 'I Lorentz-Drude fit' });
	await expect(page.getByText('of B against I, in per cent')).toBeVisible();
	await expect(page.getByText(/B and I differ most, by [+−]\d+/)).toBeVisible();
	await expect(page).toHaveURL(/first=gold-drude&second=gold-lorentz-drude/);
	await page.reload({ waitUntil: 'networkidle' });
	await expect(page.getByText('of B against I, in per cent')).toBeVisible();
	await page.getByLabel('Second dataset').selectOption({ label: 'B Drude, infrared fit' });
	await expect(page.getByText('A dataset does not differ from itself.')).toBeVisible();
});

test('draws at most five curves and lets them be exchanged', async ({ page }) => {
	await openMaterial(page, 'gold');
	const boxes = page.getByRole('group', { name: 'Datasets' }).getByRole('checkbox');
	const checked = () =>
		boxes.evaluateAll((all) => all.filter((box) => (box as HTMLInputElement).checked).length);
	expect(await checked()).toBe(5);
	expect(
		await boxes.evaluateAll((all) => all.filter((box) => (box as HTMLInputElement).disabled).length)
	).toBe((await boxes.count()) - 5);
	await boxes.first().uncheck();
	await expect.poll(checked).toBe(4);
	await page.getByRole('checkbox', { name: /Plasma, 9 eV/ }).check();
	await expect.poll(checked).toBe(5);
	await expect(page).toHaveURL(/draw=gold-plasma/);
	await expect(line(page)).toHaveAttribute('aria-valuetext', /Plasma, 9 eV/);
});

test('draws the real axis when it comes into view, and gives the numbers by one key', async ({ page }) => {
	const calm = watchTrouble(page);
	const asked: string[] = [];
	page.on('request', (request) => asked.push(request.url()));
	await openMaterial(page, 'silicon');
	const part = page.getByRole('region', { name: 'On the real axis' });
	await part.scrollIntoViewIfNeeded();
	const plot = part.getByRole('img', { name: /Refractive index/ });
	await expect(plot.locator('.scatterlayer .trace').first()).toBeVisible({ timeout: 15_000 });
	await expect(plot.locator('.modebar-btn, .legend')).toHaveCount(0);
	await part.getByText('wavelength').click();
	await expect(plot).toContainText('Wavelength in vacuum');
	await part.getByRole('radio', { name: /ε″/ }).check();
	await expect(part.getByRole('img', { name: /Real and imaginary part/ })).toBeVisible();
	await page.keyboard.press('t');
	await expect(part.getByRole('table').first()).toBeVisible();
	await page.reload({ waitUntil: 'networkidle' });
	await part.scrollIntoViewIfNeeded();
	await expect(part.getByRole('radio', { name: 'wavelength' })).toBeChecked();
	const origin = new URL(page.url()).origin;
	expect(asked.filter((address) => !address.startsWith(origin) && !/^(data|blob):/.test(address))).toEqual(
		[]
	);
	calm();
});

test('saves the drawn numbers with their origin, and the picture', async ({ page }) => {
	await openMaterial(page, 'silicon?at=38');
	const file = page.waitForEvent('download');
	await page.getByRole('button', { name: 'Save as CSV' }).click();
	const download = await file;
	expect(download.suggestedFilename()).toBe('silicon-imaginary-axis.csv');
	const lines = (await readFile(await download.path(), 'utf8')).split('\r\n');
	expect(lines[0]).toContain('Permittivity of Silicon');
	expect(lines.join()).toContain('silicon-table@1.0');
	const head = lines.findIndex((text) => text.startsWith('xi,'));
	expect(lines[head + 1]).toMatch(/^rad\/s,eV,nm,1/);
	const cells = lines[head + 2].split(',').map(Number);
	expect(cells.every(Number.isFinite)).toBe(true);

	const drawing = page.waitForEvent('download');
	await page.getByRole('button', { name: 'SVG', exact: true }).click();
	const stack = await readFile(await (await drawing).path(), 'utf8');
	expect(stack).toContain('silicon-table@1.0');
	expect(stack).not.toMatch(/var\(--|(href|src)="/);
	const pixels = page.waitForEvent('download');
	await page.getByRole('button', { name: 'PNG', exact: true }).click();
	expect((await readFile(await (await pixels).path())).subarray(1, 4).toString()).toBe('PNG');

	await page.getByRole('region', { name: 'On the real axis' }).scrollIntoViewIfNeeded();
	const picture = page.waitForEvent('download');
	await page.getByRole('button', { name: 'Save as SVG' }).last().click();
	const svg = await readFile(await (await picture).path(), 'utf8');
	expect(svg).toContain('<svg');
	expect(svg).not.toMatch(/(href|src)="https?:/);
});

test('leads from a dataset to an arrangement', async ({ page }) => {
	await openMaterial(page, 'water?at=38');
	await page.getByRole('region', { name: 'Use in an arrangement' }).getByRole('link').first().click();
	await expect(page).toHaveURL(/\/\?medium=water-[a-z-]+@\d+\.\d+&at=38/);
});

test('unfolds checks, sources and citations, which can be copied', async ({ page, context }) => {
	await context.grantPermissions(['clipboard-read', 'clipboard-write']);
	await openMaterial(page, 'gold#gold-lorentz-drude');
	const dataset = page.locator('#gold-lorentz-drude');
	await expect(dataset).toHaveAttribute('open', '');
	await expect(dataset.getByText(/f-sum counts/)).toBeVisible();
	await expect(dataset.getByRole('link', { name: /doi:10\.1364/ })).toHaveAttribute(
		'href',
		/^https:\/\/doi\.org\//
	);
	await dataset.getByRole('button', { name: 'Copy BibTeX' }).click();
	await expect(dataset.getByText('Copied')).toBeVisible();
	expect(await page.evaluate(() => navigator.clipboard.readText())).toContain('@article{');
});

test('says that there is no such material, and where to look', async ({ page }) => {
	const response = await page.goto('/materials/unobtainium');
	expect(response?.status()).toBe(404);
	await expect(page.locator('main')).toContainText('unobtainium');
	await expect(page.getByRole('link', { name: 'Look in the library' })).toBeVisible();
});

test.describe('without script', () => {
	test.use({ javaScriptEnabled: false });

	test('draws the imaginary axis and takes a choice by form', async ({ page }) => {
		await page.goto('/materials/gold');
		await expect(page.locator('.stack path').first()).toBeVisible();
		await page.getByLabel('First dataset').selectOption('gold-drude');
		await page.getByLabel('Second dataset').selectOption('gold-lorentz-drude');
		await page.getByRole('button', { name: 'Draw these' }).click();
		await expect(page.getByText('of B against I, in per cent')).toBeVisible();
	});
});
