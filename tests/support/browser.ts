import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';

/** What every browser test needs: trouble that a page hides in its console, and the accessibility audit. */

/**
 * Collects errors of the page; call the answer at the end of a test.
 *
 * @param meant what the test itself brings about, as an answer that refuses a form
 */
export function watchTrouble(page: Page, meant?: RegExp): () => void {
	const trouble: string[] = [];
	page.on('console', (message) => {
		if (message.type() === 'error' && !meant?.test(message.text())) trouble.push(message.text());
	});
	page.on('pageerror', (error) => trouble.push(error.message));
	return () => expect(trouble, 'errors in the console').toEqual([]);
}

/** No violation at all: what cannot be mended is not built. */
export async function expectAccessible(page: Page): Promise<void> {
	const { violations } = await new AxeBuilder({ page }).analyze();
	const told = violations.map(
		({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`
	);
	expect(told).toEqual([]);
}

/** The study page at an address, with every number under the hairline computed and not only read off a curve. */
export async function openStudy(page: Page, query = ''): Promise<void> {
	await page.goto(`/${query}`);
	await computed(page);
}

/** Waits until what stands under the hairline was computed at this very separation. */
export async function computed(page: Page): Promise<void> {
	const reading = page.locator('[data-reading]');
	await expect(reading.locator('[data-computed="true"]').first()).toBeVisible();
	await expect(reading.locator('[data-computed="false"]')).toHaveCount(0);
}

export const hairline = (page: Page) => page.getByRole('slider', { name: 'Separation' });
export const valueOf = (page: Page, choice: string) =>
	page.locator(`[data-reading] [data-choice="${choice}"]`);
