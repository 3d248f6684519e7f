import { expect, test, type Page } from '@playwright/test';
import { computed, expectAccessible, valueOf, watchTrouble } from '../support/browser.ts';

/** The first hour of a student, with the lead of the group at another browser. */

async function enter(page: Page, name: string): Promise<void> {
	await page.goto('/sign-in');
	await page.getByRole('button', { name: `Sign in as ${name}`, exact: true }).click();
	await expect(
		page.getByRole('navigation', { name: 'Account' }).getByRole('link', { name, exact: true })
	).toBeVisible();
}

test('a student is invited, duplicates the lead’s study, changes one choice, sees the difference and comments', async ({
	page: lead,
	browser
}) => {
	test.setTimeout(120_000);
	const calm = watchTrouble(lead);
	const unique = Date.now().toString(36);
	const name = `Two mirrors ${unique}`;

	// The lead starts a study: the static term is asked for, and nothing is chosen beforehand.
	await enter(lead, 'Larkmoor lead');
	await lead.goto('/studies/new?group=');
	await expect(lead.getByRole('radio', { name: /^Drude/ })).not.toBeChecked();
	await expect(lead.getByRole('radio', { name: /^Plasma/ })).not.toBeChecked();
	await expectAccessible(lead);
	await lead.getByRole('link', { name: 'For Cantilevers' }).click();
	await lead.getByLabel('Name').fill(name);
	await lead.getByRole('radio', { name: /A gold film on silica/ }).check();
	await lead.getByRole('radio', { name: /^Drude/ }).check();
	await lead.getByRole('button', { name: 'Start the study' }).click();
	const bar = lead.getByRole('region', { name: 'Saved study' });
	await expect(bar).toContainText(name);
	await expect(valueOf(lead, 'A')).toContainText('Gold: Drude, chosen');
	await lead.getByText('Name, notes, reasons, and who sees it').click();
	await lead.getByRole('combobox', { name: /^Who sees it/ }).selectOption('group');
	await lead.getByRole('button', { name: 'Save the description' }).click();
	await expect(bar).toContainText('seen by Cantilevers');
	const original = lead.url();

	// An invitation by mail, taken up in the other browser.
	await lead.goto('/account/groups/cantilevers');
	await lead.getByLabel('E-mail address').fill(`student-${unique}@larkmoor.example`);
	await lead.getByRole('button', { name: 'Send the invitation' }).click();
	await expect(lead.getByRole('status')).toContainText('is on its way');
	const student = await (await browser.newContext({ baseURL: new URL(lead.url()).origin })).newPage();
	const studentCalm = watchTrouble(student);
	await expect(async () => {
		await student.goto('/demo/mail');
		await student
			.getByRole('row', { name: new RegExp(`student-${unique}`) })
			.getByRole('link')
			.first()
			.click({ timeout: 1000 });
	}).toPass({ timeout: 20_000 });
	await student.getByRole('link', { name: /\/invitation/ }).click();
	await student.getByLabel('Your name').fill(`Student ${unique}`);
	await student.getByRole('button', { name: 'Accept the invitation' }).click();
	await expect(
		student.getByRole('navigation', { name: 'Account' }).getByRole('link', { name: `Student ${unique}` })
	).toBeVisible();

	// The group's study, and a copy of one's own in which one choice is changed.
	await student.goto('/studies?show=group');
	await student.getByRole('link', { name, exact: true }).click();
	await student.getByRole('button', { name: 'Duplicate it' }).click();
	await expect(student.getByRole('region', { name: 'Saved study' })).toContainText(`${name} (copy)`);
	await computed(student);
	await student.getByRole('button', { name: 'Add Drude and plasma' }).click();
	await computed(student);
	await expect(valueOf(student, 'C')).toContainText('Gold: plasma, chosen');
	await student.getByText('Choices side by side, at separations of your own').click();
	await student.getByLabel('Separations, with commas between').fill('50 nm, 1 um');
	const table = student.getByRole('region', { name: 'Choices at chosen separations' });
	await expect(table.getByRole('row', { name: /^1\.00 µm/ })).toContainText('%');
	// By far the larger part of the pull at a micrometre is the same; the plasma rule adds the static TE term.
	await expect(student.getByRole('listitem').filter({ hasText: /C against A:\s+at most −/ })).toBeVisible();
	await student.getByLabel('All published versions of').selectOption({ index: 1 });
	await expect(
		student.getByRole('region', { name: 'Spread over published versions' }).getByRole('row')
	).toHaveCount(3);
	await expect(student.getByRole('region', { name: 'Spread over published versions' })).toContainText('Pa');
	// Where the film has become bulk.
	await student.getByText(/^Ladder: one parameter swept/).click();
	await student.getByRole('button', { name: 'Climb it' }).click();
	await expect(student.getByText(/^A: bulk within 1 % from/)).toBeVisible({ timeout: 20_000 });
	await expectAccessible(student);
	await expect(student.getByRole('status').filter({ hasText: /^Saved \d/ })).toBeVisible({ timeout: 10_000 });

	// What they found is said where the lead sees it.
	await student.goto(`${new URL(original).pathname}/comments`);
	await student
		.getByLabel('Comment', { exact: true })
		.fill('Plasma pulls more at a micrometre, @Larkmoor lead.');
	await student.getByLabel('At a separation, nm').fill('1000');
	await student.getByRole('button', { name: 'Add the comment' }).click();
	await expect(student.getByText('The comment is there.')).toBeVisible();
	await lead.goto('/notifications');
	await expect(lead.getByText(`Student ${unique} names you in a comment on "${name}"`)).toBeVisible();

	// The lead freezes the study; the student recomputes it to the same bits, and changes nothing of it.
	await lead.goto(original);
	await lead.getByRole('link', { name: 'Freeze' }).click();
	await expectAccessible(lead);
	await lead.getByRole('combobox', { name: /^Who sees the record/ }).selectOption('group');
	await lead.getByRole('button', { name: 'Freeze' }).click();
	await expect(lead.getByRole('heading', { level: 1 })).toHaveText(name);
	await expect(lead).toHaveURL(/\/records\/[0-9a-f]{64}$/);
	await expectAccessible(lead);
	await student.goto('/records?show=group');
	await expectAccessible(student);
	await student.getByRole('link', { name, exact: true }).click();
	await student.getByRole('button', { name: 'Recompute' }).click();
	await expect(student.getByText('Identical.')).toBeVisible();
	await expect(student.getByRole('button', { name: 'Change' })).toHaveCount(0);
	const [download] = await Promise.all([
		student.waitForEvent('download'),
		student.getByRole('link', { name: 'Archive' }).click()
	]);
	expect(download.suggestedFilename()).toMatch(/^record-[0-9a-f]{12}-archive\.zip$/);

	// Somebody without an account reads by a link, until it is taken back.
	await lead.goto(`${original}/share`);
	await expectAccessible(lead);
	await lead.getByRole('button', { name: 'Make a link' }).click();
	const address = (await lead.getByRole('status').locator('code').textContent()) ?? '';
	const visitor = await (await browser.newContext()).newPage();
	await visitor.goto(address);
	await expect(visitor.getByRole('heading', { level: 1 })).toHaveText(name);
	await expect
		.poll(() => visitor.getByRole('img').evaluate((image: HTMLImageElement) => image.naturalWidth))
		.toBeGreaterThan(300);
	await expectAccessible(visitor);
	await lead.getByRole('button', { name: /^Take back the link/ }).click();
	await expect(lead.getByText('The link is taken back.')).toBeVisible();
	expect((await visitor.goto(address))?.status()).toBe(404);
	calm();
	studentCalm();
});
