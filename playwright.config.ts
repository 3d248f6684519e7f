import { defineConfig } from '@playwright/test';

/** `npm test -- browser` starts the application and says where it is; the browser is the distribution's. */
const baseURL = process.env.HAIRSBREADTH_TEST_ORIGIN;
const report = process.env.HAIRSBREADTH_BROWSER_REPORT;
const asRoot = process.getuid?.() === 0;

export default defineConfig({
	testDir: 'tests/e2e',
	outputDir: 'test-results',
	forbidOnly: true,
	retries: 0,
	workers: 1,
	timeout: 30_000,
	// A machine that two other things keep busy is slow, not wrong.
	expect: { timeout: 10_000 },
	reporter: report ? [['list'], ['json', { outputFile: report }]] : 'list',
	use: {
		baseURL,
		locale: 'en-GB',
		timezoneId: 'UTC',
		screenshot: 'only-on-failure',
		trace: 'off',
		launchOptions: {
			executablePath: process.env.HAIRSBREADTH_CHROMIUM ?? '/usr/bin/chromium-headless-shell',
			args: [
				// The sandbox needs an account that is not root.
				...(asRoot ? ['--no-sandbox'] : []),
				'--disable-gpu',
				// Nothing outside this machine is ever asked for.
				'--host-resolver-rules=MAP * ~NOTFOUND, EXCLUDE localhost, EXCLUDE 127.0.0.1'
			]
		}
	}
});
