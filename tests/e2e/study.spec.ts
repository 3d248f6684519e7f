import { expect, test } from '@playwright/test';
import { computed, hairline, openStudy, valueOf, watchTrouble } from '../support/browser.ts';

/** A first visit, and what a person does with the hairline. */

test('a first visit shows two rival curves, their sign bars and what the numbers rest on', async ({
	page
}) => {
	const noTrouble = watchTrouble(page);
	await openStudy(page);

	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Gold against silica, in bromobenzene');
	const sign = page.getByRole('img', { name: /^Sign: A attracts from 1\.00 nm .* repels .*; B repels/ });
	await expect(sign).toBeVisible();
	for (const choice of ['A', 'B']) {
		await expect(page.locator(`svg g[data-choice="${choice}"]`).first()).toBeVisible();
		await expect(valueOf(page, choice)).toContainText('repulsion');
		await expect(valueOf(page, choice)).toContainText('bound');
	}

	const block = page.getByRole('region', { name: 'What this number rests on' });
	await expect(block).toContainText('Numerical bound');
	await expect(block.getByRole('link', { name: 'Gold' })).toBeVisible();
	await expect(block).toContainText('version 1.0');
	await expect(block).toContainText('Drude, as the model is written');
	await expect(block).toContainText('provisional');
	await expect(page.getByText("Check the supplier's safety data sheet")).toBeVisible();
	noTrouble();
});

test('the hairline goes by keyboard and says where it stands', async ({ page }) => {
	await openStudy(page);
	const slider = hairline(page);
	await expect(slider).toHaveAttribute(
		'aria-valuetext',
		/^38\.0 nm; choice A .*repulsion; choice B .*repulsion$/
	);

	await slider.focus();
	await page.keyboard.press('ArrowRight');
	await expect(slider).toHaveAttribute('aria-valuenow', '38.38');
	await page.keyboard.press('Shift+ArrowLeft');
	await expect(slider).toHaveAttribute('aria-valuenow', '17.81');
	await page.keyboard.press('Home');
	await expect(slider).toHaveAttribute('aria-valuetext', /choice A .*attraction; choice B .*repulsion/);
	await computed(page);
	await expect(page.getByText('disagree on the sign here')).toBeVisible();
	await expect(page).toHaveURL(/[?&]at=1$/);
	await page.keyboard.press('End');
	await expect(slider).toHaveAttribute('aria-valuenow', '10000');
});

test('the hairline follows the pointer anywhere in the stack, and the address follows the hairline', async ({
	page
}) => {
	await openStudy(page);
	const stack = page.getByRole('group', { name: 'Curves over separation' });
	const box = await stack.boundingBox();
	if (!box) throw new Error('the stack is not on the page');
	await page.mouse.move(box.x + box.width * 0.4, box.y + 300);
	await page.mouse.down();
	await page.mouse.move(box.x + box.width * 0.6, box.y + 300, { steps: 10 });
	await page.mouse.up();
	await expect(page).toHaveURL(/[?&]at=\d{3}(\.\d)?$/);
	await computed(page);
	await expect(hairline(page)).toBeFocused();
});

test('a parked line gives the difference and the mean exponent', async ({ page }) => {
	await openStudy(page, '?at=100');
	await page.keyboard.press('p');
	await expect(page).toHaveURL(/[?&]parked=100$/);
	await hairline(page).focus();
	await page.keyboard.press('Shift+ArrowRight');
	await expect(valueOf(page, 'B')).toContainText(/change .*mean exponent \u2212[3-5]\.\d/);
});

test('the numbers stand as a table one key away', async ({ page }) => {
	await openStudy(page);
	await page.keyboard.press('t');
	const table = page.getByRole('table');
	await expect(table.getByRole('columnheader')).toHaveText([
		'separation',
		'A',
		'bound of A',
		'B',
		'bound of B'
	]);
	await expect(table.getByRole('row')).toHaveCount(230);
	await page.keyboard.press('t');
	await expect(table).toHaveCount(0);
});

test('units are switched where they stand and remembered', async ({ page }) => {
	await openStudy(page);
	await page.getByLabel('Unit of pressure').selectOption('kPa');
	await expect(valueOf(page, 'A')).toContainText('kPa');
	await page.reload();
	await computed(page);
	await expect(valueOf(page, 'A')).toContainText('kPa');
});

test('the comparison switches from ideal conductors to a model choice', async ({ page }) => {
	await openStudy(page);
	await page.getByLabel('Comparison').selectOption('Difference from A, per cent');
	await expect(page.getByRole('img', { name: 'Difference from a model choice in per cent' })).toBeVisible();
	await expect(page).toHaveURL(/against=0/);
});

test('recomputing finds the same numbers to the last bit', async ({ page }) => {
	await openStudy(page);
	await page.getByRole('button', { name: 'Recompute' }).click();
	await expect(page.getByText(/Identical: all \d+ numbers/)).toBeVisible();
});

test('files carry the plotted numbers with where they come from', async ({ page }) => {
	await openStudy(page);
	const [csv] = await Promise.all([
		page.waitForEvent('download'),
		page.getByRole('button', { name: 'CSV' }).click()
	]);
	expect(csv.suggestedFilename()).toBe('gold-against-silica-in-bromobenzene.csv');
	const text = await streamText(await csv.createReadStream());
	expect(text).toContain('# Gold against silica, in bromobenzene');
	expect(text).toMatch(/\r\nnm,Pa,1,Pa,1\r\n1,-?\d/);

	const [svg] = await Promise.all([
		page.waitForEvent('download'),
		page.getByRole('button', { name: 'SVG' }).click()
	]);
	const picture = await streamText(await svg.createReadStream());
	expect(picture).toContain('at=38');
	expect(picture).not.toContain('currentColor');

	const [png] = await Promise.all([
		page.waitForEvent('download'),
		page.getByRole('button', { name: 'PNG' }).click()
	]);
	expect(png.suggestedFilename()).toMatch(/\.png$/);
});

async function streamText(stream: AsyncIterable<Buffer | string>): Promise<string> {
	const parts: string[] = [];
	for await (const part of stream) parts.push(part.toString());
	return parts.join('');
}
