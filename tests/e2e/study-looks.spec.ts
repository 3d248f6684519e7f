import { gzipSync } from 'node:zlib';
import { expect, test } from '@playwright/test';
import { expectAccessible, openStudy, valueOf } from '../support/browser.ts';

/** Widths, light and dark, paper. */

for (const width of [390, 768, 1440]) {
	for (const colorScheme of ['light', 'dark'] as const) {
		test(`nothing keeps anyone out at ${width} px in ${colorScheme}`, async ({ page }) => {
			await page.setViewportSize({ width, height: 900 });
			await page.emulateMedia({ colorScheme });
			await openStudy(page);
			await expectAccessible(page);
			await page.getByRole('button', { name: 'Change what differs in choice B' }).click();
			await page.getByRole('button', { name: 'Change left body' }).click();
			await expect(page.getByRole('listbox').getByRole('option').first()).toBeVisible();
			await expectAccessible(page);
		});
	}
}

test('the table of numbers keeps nobody out', async ({ page }) => {
	await openStudy(page, '?from=10&to=20&at=12');
	await page.keyboard.press('t');
	await expect(page.getByRole('table')).toBeVisible();
	await expectAccessible(page);
});

test('a phone keeps the reading in sight and never scrolls sideways', async ({ page }) => {
	await page.setViewportSize({ width: 390, height: 844 });
	await openStudy(page);
	await expect(valueOf(page, 'A')).toBeInViewport();
	await expect(valueOf(page, 'B')).toBeInViewport();
	const sideways = await page.evaluate(
		() => document.documentElement.scrollWidth - document.documentElement.clientWidth
	);
	expect(sideways).toBe(0);
});

test('paper has the stack and the title block, and no control', async ({ page }) => {
	await openStudy(page);
	await page.emulateMedia({ media: 'print' });
	await expect(page.getByRole('button', { name: 'Print' })).toBeHidden();
	await expect(page.getByRole('button', { name: 'Swap bodies' })).toBeHidden();
	await expect(page.getByRole('region', { name: 'What this number rests on' })).toBeVisible();
	await expect(page.getByText('?left=').first()).toBeVisible();
	const pages = (await page.pdf({ format: 'A4' })).toString('latin1').match(/\/Type\s*\/Page\b/g);
	expect(pages).toHaveLength(1);
});

test('a drag of five curves of 400 points keeps up with the screen', async ({ page }) => {
	const rivals = [
		'Drude',
		'Plasma;left:!plasma',
		'Ideal;left:!ideal',
		'Seven;medium:bromobenzene-seven-oscillators@1.0',
		'Two;medium:bromobenzene-two-oscillators@1.0'
	];
	await openStudy(
		page,
		`?left=gold-lorentz-drude@1.0&medium=bromobenzene-debye-uv@1.0&right=silica-two-oscillators@1.0&from=0.2&to=1000000&${rivals.map((rival) => `choice=${rival}`).join('&')}&at=38`
	);
	const box = await page.getByRole('group', { name: 'Curves over separation' }).boundingBox();
	if (!box) throw new Error('the stack is not on the page');
	await page.mouse.move(box.x + 120, box.y + 300);
	await page.mouse.down();
	const frames = page.evaluate(
		() =>
			new Promise<number[]>((resolve) => {
				const deltas: number[] = [];
				let before = performance.now();
				const step = (now: number) => {
					deltas.push(now - before);
					before = now;
					if (deltas.length < 120) requestAnimationFrame(step);
					else resolve(deltas.slice(5));
				};
				requestAnimationFrame(step);
			})
	);
	for (let step = 0; step < 120; step++) await page.mouse.move(box.x + 120 + (step % 60) * 8, box.y + 300);
	const deltas = (await frames).sort((a, b) => a - b);
	await page.mouse.up();
	const median = deltas[Math.floor(deltas.length / 2)];
	test.info().annotations.push({
		type: 'frames',
		description: `median ${median} ms, 95 % ${deltas[Math.floor(deltas.length * 0.95)]} ms`
	});
	// The test machine may be busy: the median tells what the page costs, a single late frame what else ran.
	expect(median).toBeLessThan(20);
});

test('the first view, without what is plotted, weighs under 200 KB', async ({ page }) => {
	const network = await page.context().newCDPSession(page);
	await network.send('Network.enable');
	const requests = new Map<string, string>();
	const weights = new Map<string, number>();
	network.on('Network.responseReceived', ({ requestId, response }) => requests.set(requestId, response.url));
	network.on('Network.loadingFinished', ({ requestId, encodedDataLength }) =>
		weights.set(requests.get(requestId) ?? requestId, encodedDataLength)
	);
	await openStudy(page);
	await page.waitForLoadState('networkidle');

	const carried = new Map([...weights].filter(([url]) => !url.includes('/api/v1/forces')));
	expect([...carried.keys()].some((url) => url.includes('.woff2'))).toBe(true);
	// The limit is of what is gzipped: the page itself leaves this server as it is, and a proxy before it packs it.
	const address = new URL('/', page.url()).href;
	expect(carried.has(address)).toBe(true);
	carried.set(address, gzipSync(await (await page.request.get(address)).body()).length);
	expect([...carried.values()].reduce((sum, weight) => sum + weight, 0)).toBeLessThan(200_000);
});
