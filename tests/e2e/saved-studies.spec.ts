import { expect, test, type Page } from '@playwright/test';
import { computed, expectAccessible, watchTrouble } from '../support/browser.ts';

/** Studies that are kept, and what becomes of them when a version that they rest on has a successor. */

async function enter(page: Page, name: string): Promise<void> {
	await page.context().clearCookies();
	await page.goto('/sign-in');
	await page.getByRole('button', { name: `Sign in as ${name}`, exact: true }).click();
	await expect(
		page.getByRole('navigation', { name: 'Account' }).getByRole('link', { name, exact: true })
	).toBeVisible();
}

/** Sends JSON as a page of the application does, and gives the answer. */
const send = (page: Page, path: string, body: unknown) =>
	page.evaluate(
		async ([to, content]) => {
			const headers = { 'content-type': 'application/json' };
			const answer = await fetch(to, { method: 'POST', headers, body: content });
			return { status: answer.status, content: await answer.json() };
		},
		[path, JSON.stringify(body)] as const
	);

/** A published version of a Drude metal, made and approved by two curators. */
async function publish(page: Page, slug: string, plasmaEnergyEv: number, parent?: string): Promise<string> {
	await enter(page, 'Larkmoor curator');
	const description = { source: 'ordal-1985', ...(parent ? { parent, note: 'A better fit.' } : {}) };
	const model = { kind: 'drude', plasmaEnergyEv, dampingEv: 0.2 };
	const made = await send(page, `/api/v1/datasets/${slug}/versions`, { model, description });
	expect(made.status).toBe(201);
	const { number, checksum, checks } = made.content.version as {
		number: string;
		checksum: string;
		checks: { code: string; severity: string }[];
	};
	const answers = Object.fromEntries(
		checks.filter(({ severity }) => severity === 'warn').map(({ code }) => [code, 'Meant for a story.'])
	);
	const at = `/api/v1/datasets/${slug}/versions/${number}`;
	expect((await send(page, `${at}/submit`, { checksum, answers })).status).toBe(200);
	await enter(page, 'Larkmoor curator 2');
	if (parent) {
		await page.goto(`/reviews/${slug}/${number}`);
		await expect(page.getByText('One study rests on this dataset.')).toBeVisible();
		await expect(page.getByText('a study that is not shared with you')).toBeVisible();
	}
	expect((await send(page, `${at}/approve`, { checksum })).status).toBe(200);
	return number;
}

test('a study keeps the version that it names, marks the newer one, and its owner has the mail', async ({
	page
}) => {
	test.setTimeout(90_000);
	const calm = watchTrouble(page);
	const slug = `lead-story-${Date.now().toString(36)}`;
	await enter(page, 'Larkmoor curator');
	expect(
		(await send(page, '/api/v1/datasets', { slug, title: 'For a story', material: 'lead' })).status
	).toBe(201);
	await publish(page, slug, 7.4);

	await enter(page, 'Larkmoor researcher');
	await page.goto(
		`/?left=${slug}@1.0&medium=vacuum@1.0&right=silica-two-oscillators@1.0&choice=Lead&from=10&to=1000&at=100`
	);
	await computed(page);
	await page.getByLabel('Save this study as').fill(slug);
	await page.getByRole('button', { name: 'Save the study' }).click();
	await expect(page.getByRole('region', { name: 'Saved study' })).toContainText(slug);
	const address = page.url();
	const block = page.getByRole('complementary');
	await expect(block).toContainText('no input has a newer version');

	// What is done is saved by itself, and can be undone from its history.
	await page.getByRole('button', { name: 'Swap bodies' }).click();
	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Silica against lead, across vacuum');
	await expect(page.getByRole('status').filter({ hasText: /^Saved \d/ })).toBeVisible({ timeout: 10_000 });
	await page.goto(address);
	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Silica against lead, across vacuum');
	await expectAccessible(page);
	await page.getByRole('link', { name: 'History' }).click();
	await page.getByRole('button', { name: 'Restore state 1' }).click();
	await expect(page.getByRole('heading', { level: 1 })).toHaveText('Lead against silica, across vacuum');

	await publish(page, slug, 8.1, '1.0');

	await enter(page, 'Larkmoor researcher');
	await page.goto('/notifications');
	await expect(
		page.getByText(`${slug}@2.0 is new, and your study rests on an earlier version`)
	).toBeVisible();
	await page.getByRole('link', { name: 'Open the study' }).first().click();
	await expect(page.getByRole('region', { name: 'Saved study' })).toContainText(slug);
	await expect(block.getByRole('img', { name: 'Revision' })).toBeVisible();
	await expect(block).toContainText(/Lead has version 2\.0, which changes A by [−+][\d.]+ % at 100 nm/);
	expect(page.url()).not.toContain('@2.0');
	await expect(async () => {
		await page.goto('/demo/mail');
		await expect(
			page.getByRole('link', { name: `${slug}@2.0 is new, and your study rests on an earlier version` })
		).toBeVisible({ timeout: 500 });
	}).toPass({ timeout: 15_000 });
	calm();
});

test('a lead shares a study; a member duplicates it and sees that nothing of theirs reaches it', async ({
	page,
	browser
}) => {
	const name = `Shared ${Date.now().toString(36)}`;
	await enter(page, 'Larkmoor lead');
	await page.goto('/');
	await page.getByLabel('Save this study as').fill(name);
	await page.getByRole('button', { name: 'Save the study' }).click();
	await page.getByText('Name, notes, reasons, and who sees it').click();
	await page
		.getByRole('textbox', { name: 'Notes' })
		.fill('Look at the **sign**. <img src=x onerror=alert(1)>');
	await page.getByRole('combobox', { name: /^Who sees it/ }).selectOption('group');
	await page.getByRole('button', { name: 'Save the description' }).click();
	await expect(page.getByText('Say which group may see it.')).toBeVisible();
	await expect(page.getByRole('textbox', { name: 'Notes' })).toHaveValue(/Look at the/);
	await page.getByRole('combobox', { name: /^Who sees it/ }).selectOption('group');
	await page.getByRole('combobox', { name: /^Group/ }).selectOption('cantilevers');
	await page.getByRole('button', { name: 'Save the description' }).click();
	await expect(page.getByText('seen by Cantilevers')).toBeVisible();
	await expect(page.locator('strong', { hasText: 'sign' })).toBeVisible();

	const other = await (await browser.newContext({ baseURL: new URL(page.url()).origin })).newPage();
	await enter(other, 'Larkmoor researcher');
	await other.goto('/studies?show=group');
	await expectAccessible(other);
	await other.getByRole('link', { name }).click();
	await expect(other.getByRole('region', { name: 'Saved study' })).toContainText('Larkmoor lead');
	const shared = other.url();
	await other.getByRole('link', { name: 'Comments' }).click();
	await other.getByLabel('Comment', { exact: true }).fill('Is B the newer set, @Larkmoor lead?');
	await other.getByRole('combobox', { name: /^About/ }).selectOption('1');
	await other.getByLabel('At a separation, nm').fill('38');
	await other.getByRole('button', { name: 'Add the comment' }).click();
	await expect(other.getByText('choice B, at 38.0 nm')).toBeVisible();
	await expectAccessible(other);
	await page.goto('/notifications');
	await expect(page.getByText(`Larkmoor researcher names you in a comment on "${name}"`)).toBeVisible();
	await page.getByRole('link', { name: 'Read the comments' }).first().click();
	await page.getByRole('button', { name: 'Mark the comment of Larkmoor researcher as settled' }).click();
	await expect(page.getByText('Settled by Larkmoor lead')).toBeVisible();
	await page.goto(shared);

	await other.goto(shared);
	await other.getByRole('button', { name: 'Duplicate it' }).click();
	await expect(other.getByRole('region', { name: 'Saved study' })).toContainText(`${name} (copy)`);
	await enter(other, 'Larkmoor researcher 2');
	expect((await other.goto(page.url()))?.status()).toBe(404);
	await other.goto(`/studies?show=group&search=${encodeURIComponent(name)}`);
	await expect(other.getByText('Nothing here has')).toBeVisible();
});

for (const width of [390, 1440]) {
	for (const colorScheme of ['light', 'dark'] as const) {
		test(`lists and saved studies keep nobody out at ${width} px in ${colorScheme}`, async ({ page }) => {
			await page.setViewportSize({ width, height: 900 });
			await page.emulateMedia({ colorScheme });
			await enter(page, 'Larkmoor reader');
			await page.goto('/studies');
			await expect(page.getByRole('heading', { name: 'Studies' })).toBeVisible();
			await expectAccessible(page);
			await page.goto('/');
			await page.getByRole('button', { name: 'Save the study' }).click();
			await expect(page.getByRole('region', { name: 'Saved study' })).toBeVisible();
			await computed(page);
			await page.getByText('Name, notes, reasons, and who sees it').click();
			await expectAccessible(page);
			await page.getByRole('link', { name: 'History' }).click();
			await expectAccessible(page);
			await page.goto('/studies?sort=name');
			await expectAccessible(page);
			const sideways = await page.evaluate(
				() => document.documentElement.scrollWidth - document.documentElement.clientWidth
			);
			expect(sideways).toBe(0);
		});
	}
}
