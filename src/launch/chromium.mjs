import { existsSync } from 'node:fs';
import { LaunchError } from './command.mjs';
import { aptInstall, isRoot } from './debian.mjs';

const PACKAGE = 'chromium-headless-shell';
const PLACES = ['/usr/bin/chromium-headless-shell', '/usr/bin/chromium'];

/**
 * The browser of the distribution; HAIRSBREADTH_CHROMIUM names another.
 *
 * @returns {Promise<string>}
 */
export async function findChromium() {
	const given = process.env.HAIRSBREADTH_CHROMIUM;
	if (given) {
		if (existsSync(given)) return given;
		throw new LaunchError(`HAIRSBREADTH_CHROMIUM names ${given}, which is not there.`);
	}
	const present = () => PLACES.find((place) => existsSync(place));
	if (!present() && isRoot()) {
		console.log(`Installing Debian's package ${PACKAGE} ...`);
		await aptInstall(PACKAGE);
	}
	const found = present();
	if (found) return found;
	throw new LaunchError(
		`The browser tests need Chromium. Install it:\n\n    sudo apt-get update && sudo apt-get install -y ${PACKAGE}\n`
	);
}
