import { expect, test, type Page } from '@playwright/test';
import { expectAccessible, watchTrouble } from '../support/browser.ts';

/** From an instrument's file to a version that strangers rely on, with a second person's eyes on it. */

const FILE = [
	'# film of lead, normal incidence',
	'Wellenlänge (nm);n;k;s_n',
	'2000;1,41;6,8;0,02',
	'1200;1,36;5,1;0,02',
	'1000;1,41;4,6;0,02',
	'800;1,68;4,0;0,02',
	'600;1,95;3,4;0,02',
	'500;1,89;3,1;0,02',
	'400;1,75;2,6;0,02',
	'300;1,25;2,1;0,02',
	'200;0,94;1,2;0,02',
	''
].join('\r\n');

async function enter(page: Page, name: string): Promise<void> {
	await page.context().clearCookies();
	await page.goto('/sign-in');
	await page.getByRole('button', { name: `Sign in as ${name}`, exact: true }).click();
	await expect(
		page.getByRole('navigation', { name: 'Account' }).getByRole('link', { name, exact: true })
	).toBeVisible();
}

const saved = (page: Page) =>
	expect(page.getByRole('status').filter({ hasText: /^Saved as typed/ })).toBeVisible();

test('a file becomes a version: a wrong guess mended, a warning answered, sent back once, then published', async ({
	page
}) => {
	test.setTimeout(90_000);
	// Forms that are refused on purpose, and the page of what is gone.
	const calm = watchTrouble(page, /status of (422|410)/);
	const slug = `lead-film-${Date.now().toString(36)}`;

	await enter(page, 'Larkmoor curator');
	await page.goto('/uploads/source');
	await page
		.getByLabel('BibTeX')
		.fill(
			`@article{x, author={Example Laboratory}, title={Film of ${slug}}, journal={Reports}, year={2026}}`
		);
	await page.getByRole('button', { name: 'Fill the fields and show the citation' }).click();
	await expect(page.getByText('It is cited as:')).toContainText(`Film of ${slug}`);
	await page.getByLabel('Short name').fill(slug);
	await page.getByRole('button', { name: 'Add the source' }).click();
	await expect(page.getByText(`The source ${slug} is in the library`)).toBeVisible();

	await page.goto('/uploads/dataset');
	await page.getByLabel('Material').fill('lead');
	await page.getByLabel('Title').fill('Evaporated film, for a story');
	await page.getByLabel('Short name in addresses').fill(slug);
	await page.getByRole('button', { name: 'Add the dataset' }).click();
	await page.getByRole('link', { name: 'Upload its first version' }).click();

	await page
		.getByLabel('File')
		.setInputFiles({ name: 'film.csv', mimeType: 'text/csv', buffer: Buffer.from(FILE) });
	await page.getByRole('button', { name: 'Read the file' }).click();
	await expect(page.getByRole('heading', { name: 'film.csv' })).toBeVisible();
	await expect(page.getByLabel('Columns are parted by')).toContainText('found: semicolon');
	await expect(page.getByLabel('Dataset')).toHaveValue(slug);

	// Where the check of spacing will speak is on the picture already.
	await expect(page.getByText('8 gaps are wider than 10 % and marked at the top.')).toBeVisible();

	// The fourth column is taken for the uncertainty of n; here it is of k.
	await page.getByLabel('Column 4 is').selectOption('uncertainty:3');
	await expect(page.getByText('set by you')).toBeVisible();
	await page.getByLabel('Sources').fill(slug);
	await page.getByLabel('What changed and why').fill('First film.');
	await saved(page);

	// Nothing typed is lost by closing the page.
	await page.reload();
	await expect(page.getByLabel('Column 4 is')).toHaveValue('uncertainty:3');
	await expect(page.getByLabel('What changed and why')).toHaveValue('First film.');
	await expectAccessible(page);

	await page.getByRole('button', { name: 'Make the draft and check it' }).click();
	await expect(page.getByRole('heading', { name: /^Draft: Lead/ })).toBeVisible();
	const answers = page.getByLabel('Why this may stand');
	expect(await answers.count()).toBeGreaterThan(0);
	await page.getByRole('button', { name: 'Submit version 1.0 for review' }).click();
	await expect(
		page.getByText('A version is submitted with its checks passed and each warning answered.')
	).toBeVisible();
	for (const answer of await answers.all()) await answer.fill('The film was measured only there.');
	await expectAccessible(page);
	await page.getByRole('button', { name: 'Submit version 1.0 for review' }).click();
	await expect(page.getByText('Nobody reviews what they submitted themselves')).toBeVisible();

	await enter(page, 'Larkmoor curator 2');
	await expect(
		page.getByRole('navigation', { name: 'Main' }).getByRole('link', { name: /Reviews \d+ waiting/ })
	).toBeVisible();
	await page.goto('/reviews');
	await page.getByRole('link', { name: `${slug}@1.0` }).click();
	await expect(page.getByRole('heading', { name: /^Review: Lead/ })).toBeVisible();
	await expectAccessible(page);
	await page.setViewportSize({ width: 390, height: 844 });
	const sideways = () =>
		page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
	expect(await sideways()).toBe(0);
	await page.setViewportSize({ width: 1280, height: 800 });
	await page.getByRole('button', { name: 'Send it back' }).click();
	await expect(page.getByText('Look at the marked fields again.')).toBeVisible();
	await page.getByLabel('Reason').fill('Say which substrate.');
	await page.getByRole('button', { name: 'Send it back' }).click();
	await expect(page.getByRole('heading', { name: 'Reviews', exact: true })).toBeVisible();

	await enter(page, 'Larkmoor curator');
	await page.goto('/notifications');
	await expect(page.getByText(`${slug}@1.0 came back from review`)).toBeVisible();
	await expect(page.getByText('Say which substrate.').first()).toBeVisible();
	await expectAccessible(page);
	await page.getByRole('link', { name: 'Correct it' }).first().click();
	await page.getByRole('link', { name: 'Change the file' }).click();
	await page.getByLabel('Substrate').fill('fused silica');
	await saved(page);
	await page.getByRole('button', { name: 'Make the draft anew and check it' }).click();
	await expect(page.getByLabel('Why this may stand').first()).toHaveValue(
		'The film was measured only there.'
	);
	await page.getByRole('button', { name: 'Submit version 1.0 for review' }).click();
	await expect(page.getByText('fused silica')).toBeVisible();

	await enter(page, 'Larkmoor curator 2');
	await page.goto(`/reviews/${slug}/1.0`);
	await page.getByRole('button', { name: 'Publish version 1.0' }).click();
	await expect(page).toHaveURL(new RegExp(`/datasets/${slug}/versions/1.0$`));
	await expect(page.getByRole('region', { name: 'Title block' })).toContainText('published');

	// A better one can be recommended, and a bad one withdrawn; its address stays and says why.
	await page.getByText('Withdraw version 1.0').click();
	await page.getByLabel('Why it is withdrawn').fill('The story is over.');
	await page.getByRole('button', { name: 'Withdraw it for good' }).click();
	await expect(page.getByText('The story is over.')).toBeVisible();
	calm();
	const answer = await page.request.get(`/datasets/${slug}/versions/1.0`);
	expect(answer.status()).toBe(410);
	expect(await answer.text()).toContain('The story is over.');
});

test('a closed form is typed field by field, drawn, and the JSON says the same', async ({ page }) => {
	const calm = watchTrouble(page);
	await enter(page, 'Larkmoor curator');
	await page.goto('/uploads');
	await page.getByRole('button', { name: 'Enter a closed form' }).click();
	await page.getByLabel('Begin with').selectOption('drude');
	await page.getByRole('button', { name: 'Add it' }).click();
	await page.getByLabel('Plasma energy, eV').fill('9');
	await page.getByLabel('Damping, eV').fill('abc');
	await expect(page.getByText(/model\.dampingEv/)).toBeVisible();
	await page.getByLabel('Damping, eV').fill('0.035');
	await expect(page.getByRole('img', { name: /ε\(iξ\)/ })).toBeVisible();
	await expect(page.getByLabel('The model as JSON')).toHaveValue(/"plasmaEnergyEv": 9/);
	await page.getByLabel('The model as JSON').fill('{"kind":"constant","value":2.1}');
	await expect(page.getByLabel('Permittivity, 1')).toHaveValue('2.1');
	await saved(page);
	calm();
});

test('a second window of the same upload is told, and overwrites nothing', async ({ page, context }) => {
	await enter(page, 'Larkmoor curator');
	await page.goto('/uploads');
	await page.getByLabel('Or rows pasted here').fill('eV;n;k\n1;1,5;0,1\n2;1,6;0,2\n');
	await page.getByRole('button', { name: 'Read the file' }).click();
	await expect(page.getByRole('heading', { name: 'pasted.txt' })).toBeVisible();
	const second = await context.newPage();
	await second.goto(page.url());
	await page.getByLabel('What changed and why').fill('from the first');
	await saved(page);
	await second.getByLabel('What changed and why').fill('from the second');
	await expect(second.getByText('This upload was saved in another window')).toBeVisible();
	await second.reload();
	await expect(second.getByLabel('What changed and why')).toHaveValue('from the first');
});

test('two versions stand side by side, without script too', async ({ browser, page }) => {
	const address = '/compare?a=titanium-lorentz-drude@1.0&b=gold-lorentz-drude@1.0&separations=10,100';
	await page.goto(address);
	await expect(page.getByRole('region', { name: 'Changed figures' })).toContainText(
		'of[2].terms[5].energyEv'
	);
	await expect(page.getByRole('region', { name: /^Pressure, / }).first()).toContainText('100 nm');
	await expectAccessible(page);
	await page.goto('/compare?a=titanium-lorentz-drude@9.0&b=gold-lorentz-drude@1.0');
	await expect(page.getByText('there is no version "titanium-lorentz-drude@9.0"')).toBeVisible();

	const plain = await (await browser.newContext({ javaScriptEnabled: false })).newPage();
	await plain.goto(new URL(address, page.url()).href);
	await expect(plain.getByRole('region', { name: 'Changed figures' })).toContainText('19.43');
});

for (const width of [390, 1440]) {
	for (const colorScheme of ['light', 'dark'] as const) {
		test(`the curators' pages keep nobody out at ${width} px in ${colorScheme}`, async ({ page }) => {
			await page.setViewportSize({ width, height: 900 });
			await page.emulateMedia({ colorScheme });
			await enter(page, 'Larkmoor curator');
			for (const path of [
				'/reviews',
				'/uploads',
				'/uploads/material',
				'/uploads/source',
				'/compare',
				'/notifications'
			]) {
				await page.goto(path);
				await expectAccessible(page);
				const sideways = await page.evaluate(
					() => document.documentElement.scrollWidth - document.documentElement.clientWidth
				);
				expect([path, sideways]).toEqual([path, 0]);
			}
		});
	}
}
