import { expect, test, type Page } from '@playwright/test';
import { watchTrouble } from '../support/browser.ts';

const line = (page: Page) => page.getByRole('slider', { name: 'Energy line' });
const rows = (page: Page) => page.locator('tbody tr');
const search = (page: Page) => page.getByRole('searchbox', { name: /Search by material/ });

/** Ready when the page has stopped asking: script answers from then on. */
async function openLibrary(page: Page, query = ''): Promise<void> {
	await page.goto(`/library${query}`);
	await page.waitForLoadState('networkidle');
}

test('finds datasets while one types and says how many there are', async ({ page }) => {
	const calm = watchTrouble(page);
	await openLibrary(page);
	await expect(page.getByRole('status')).toContainText(/\d+ versions of \d+ materials/);
	await search(page).pressSequentially('bromob');
	await expect(page).toHaveURL(/search=bromob/);
	await expect(rows(page).first()).toContainText('Bromobenzene');
	const shown = await rows(page).count();
	expect(shown).toBeGreaterThanOrEqual(2);
	await expect(page.getByRole('status')).toContainText(`${shown} versions of 1 material`);
	await expect(search(page)).toBeFocused();
	calm();
});

test('narrows by class and quality and keeps both in the address', async ({ page }) => {
	await openLibrary(page);
	await page.getByRole('group', { name: 'Class' }).getByRole('link', { name: 'metal' }).click();
	await expect(page).toHaveURL(/class=metal/);
	await page.getByRole('group', { name: 'Quality' }).getByRole('link', { name: 'provisional' }).click();
	await expect(page).toHaveURL(/class=metal&quality=provisional/);
	const qualities = await page.locator('td.quality').allInnerTexts();
	expect(qualities.length).toBeGreaterThan(0);
	expect(new Set(qualities.map((text) => text.trim()))).toEqual(new Set(['provisional']));
	await expect(page.getByRole('img', { name: 'liquid' })).toHaveCount(0);
});

test('finds what was measured at the energy under the red line', async ({ page }) => {
	await openLibrary(page, '?at=100');
	await page.getByRole('link', { name: /at the red line/ }).click();
	await expect(page).toHaveURL(/coversEv=0\.987/);
	for (const label of await page
		.locator('td.bar svg')
		.evaluateAll((bars) => bars.map((bar) => bar.ariaLabel))) {
		expect(label).not.toContain('no measured range');
	}
	await page.getByRole('link', { name: 'any frequency' }).click();
	await expect(page).not.toHaveURL(/coversEv/);
});

test('sorts by a column, and the other way round on the second press', async ({ page }) => {
	await openLibrary(page, '?class=liquid');
	const head = page.getByRole('columnheader', { name: 'ε(0)' });
	await head.getByRole('link').click();
	await expect(head).toHaveAttribute('aria-sort', 'ascending');
	const values = async () =>
		(await page.locator('td.static').allInnerTexts()).map((text) => Number(text)).filter(Number.isFinite);
	const ascending = await values();
	expect(ascending.length).toBeGreaterThan(5);
	expect([...ascending].sort((a, b) => a - b)).toEqual(ascending);
	await head.getByRole('link').click();
	await expect(head).toHaveAttribute('aria-sort', 'descending');
	const descending = await values();
	expect([...descending].sort((a, b) => b - a)).toEqual(descending);
});

test('the line moves by keys and by the mouse, and tells what is measured there', async ({ page }) => {
	await openLibrary(page);
	const slider = line(page);
	await expect(slider).toHaveAttribute('aria-valuetext', /100 nm; measured there in \d+ of \d+ datasets/);
	await slider.focus();
	const before = Number(await slider.getAttribute('aria-valuenow'));
	await page.keyboard.press('ArrowRight');
	await expect
		.poll(async () => Number(await slider.getAttribute('aria-valuenow')) / before)
		.toBeCloseTo(1.01, 6);
	await page.keyboard.press('Shift+ArrowLeft');
	await expect
		.poll(async () => Number(await slider.getAttribute('aria-valuenow')) / before)
		.toBeCloseTo(1.01 / 10 ** (1 / 3), 6);
	await page.keyboard.press('End');
	await expect(slider).toHaveAttribute('aria-valuetext', /at 1.00 nm/);
	await expect(page).toHaveURL(/at=1(&|$)/);

	const bar = page.locator('td.bar').nth(3);
	const box = await bar.boundingBox();
	if (box === null) throw new Error('the bar is not drawn');
	await page.mouse.move(box.x + box.width * 0.2, box.y + 10);
	await page.mouse.down();
	await page.mouse.move(box.x + box.width * 0.3, box.y + 40, { steps: 4 });
	await page.mouse.up();
	const drawn = await bar.evaluate((cell) => {
		const [row, stroke] = [cell, cell.querySelector('.line')].map((one) => one?.getBoundingClientRect());
		return row && stroke ? (stroke.left - row.left) / row.width : Number.NaN;
	});
	expect(drawn).toBeGreaterThan(0.27);
	expect(drawn).toBeLessThan(0.33);
});

test('a shared address shows the same list and the same line', async ({ page, browser }) => {
	await openLibrary(page, '?search=gold&sort=source&direction=descending&at=38');
	const other = await browser.newPage();
	await other.goto(page.url());
	expect(await other.locator('tbody').innerText()).toBe(await page.locator('tbody').innerText());
	await expect(line(other)).toHaveAttribute('aria-valuetext', /38.0 nm/);
	await other.close();
});

test('tells what to change when nothing fits', async ({ page }) => {
	await openLibrary(page, '?search=unobtainium&class=metal');
	await expect(page.getByText('No published dataset has all of this')).toBeVisible();
	await page
		.getByRole('listitem')
		.filter({ hasText: 'unobtainium' })
		.getByRole('link', { name: 'drop it' })
		.click();
	await expect(page).toHaveURL(/\/library\?class=metal$/);
	expect(await rows(page).count()).toBeGreaterThan(10);
});

test('reports an address that it cannot follow and shows the rest', async ({ page }) => {
	await openLibrary(page, '?class=steel&coversEv=-3&quality=checked');
	await expect(page.getByText('Left out of the search:')).toHaveCount(2);
	await expect(page.locator('td.quality').first()).toContainText('checked');
});

test('shows materials without data when asked', async ({ page }) => {
	await openLibrary(page);
	await page.getByRole('link', { name: /show \d+ without data/ }).click();
	await expect(page.getByText('no dataset yet').first()).toBeVisible();
	await page.getByRole('row').filter({ hasText: 'no dataset yet' }).getByRole('link').first().click();
	await expect(page.getByText(/No dataset of .* is published yet/)).toBeVisible();
});

test('pages through a long list without losing or repeating a row', async ({ page }) => {
	await openLibrary(page, '?limit=40');
	const seen: string[] = [];
	const refs = () =>
		page.locator('td.version a').evaluateAll((links) => links.map((link) => link.getAttribute('href') ?? ''));
	seen.push(...(await refs()));
	for (let turn = 0; turn < 10; turn++) {
		const next = page.getByRole('link', { name: 'Next 40 datasets' });
		if ((await next.count()) === 0) break;
		const first = await page.locator('td.version a').first().getAttribute('href');
		await next.click();
		await expect(page.locator('td.version a').first()).not.toHaveAttribute('href', first ?? '');
		seen.push(...(await refs()));
	}
	expect(new Set(seen).size).toBe(seen.length);
	await expect(page.getByRole('link', { name: 'First 40 datasets' })).toBeVisible();
	const total = Number(/^(\d+)/.exec(await page.getByRole('status').innerText())?.[1]);
	expect(seen.length).toBe(total);
});

test.describe('without script', () => {
	test.use({ javaScriptEnabled: false });

	test('searches, sorts and narrows', async ({ page }) => {
		await page.goto('/library?class=liquid');
		await search(page).fill('water');
		await page.getByRole('button', { name: 'Search the library' }).click();
		await expect(page).toHaveURL(/class=liquid/);
		await expect(page).toHaveURL(/search=water/);
		await expect(rows(page).first()).toContainText('Water');
		await page.getByRole('columnheader', { name: 'Source' }).getByRole('link').click();
		await expect(page).toHaveURL(/sort=source/);
	});
});
