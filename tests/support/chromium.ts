import { chromium, type Browser } from '@playwright/test';

/** The distribution's browser, for stories that need a server of their own beside it. */
export function openChromium(): Promise<Browser> {
	return chromium.launch({
		executablePath: process.env.HAIRSBREADTH_CHROMIUM ?? '/usr/bin/chromium-headless-shell',
		args: [
			// The sandbox needs an account that is not root.
			...(process.getuid?.() === 0 ? ['--no-sandbox'] : []),
			'--disable-gpu',
			// Nothing outside this machine is ever asked for.
			'--host-resolver-rules=MAP * ~NOTFOUND, EXCLUDE localhost, EXCLUDE 127.0.0.1'
		]
	});
}
