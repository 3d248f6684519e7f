/**
 * `npm test`: every check, from nothing. Each stage shows its own output; one that fails does not hide the others; the
 * last line adds them up. `npm test -- unit browser` runs only the named stages.
 */
import { rmSync } from 'node:fs';
import { ensureBuild } from './build.mjs';
import { findChromium } from './chromium.mjs';
import { LaunchError, run } from './command.mjs';
import { prepareDatabase } from './database.mjs';
import { freePort } from './free-port.mjs';
import { ensurePackages, npm } from './packages.mjs';
import { root, stateFile } from './place.mjs';
import { startCluster } from './postgres.mjs';
import { startServer } from './server.mjs';
import { runStack } from './stack.mjs';
import { BUILT_WORKER, keepWorkers } from './workers.mjs';
import { countExit, countReport } from './test-counts.mjs';

/** @typedef {import('./test-counts.mjs').Counts} Counts */
/** @typedef {import('./stack.mjs').Stack} Stack */

/** In this order; the browser needs the build, and a broken build should not cost the answers of the others. */
/** @type {Record<string, (stack: Stack) => Promise<Counts>>} */
const STAGES = { types, lint, unit, build, database, browser };

const shown = {
	cwd: root,
	show: true,
	env: { ...process.env, FORCE_COLOR: process.stdout.isTTY ? '1' : '0' }
};

async function types() {
	return countExit((await run(...npm(['run', '--silent', 'types']), shown)).code);
}

async function lint() {
	return countExit((await run(...npm(['run', '--silent', 'lint']), shown)).code);
}

async function unit() {
	return vitest('unit', ['--project', 'unit', '--project', 'component']);
}

/** @param {Stack} stack */
async function build({ onStop }) {
	const { release } = await ensureBuild();
	onStop(release);
	return countExit(0);
}

/** @param {Stack} stack */
async function database({ onStop }) {
	const chromium = await findChromium();
	const cluster = await startCluster({ throwaway: true });
	onStop(cluster.stop);
	return vitest('database', ['--project', 'database'], {
		HAIRSBREADTH_TEST_SERVER: cluster.url,
		HAIRSBREADTH_CHROMIUM: chromium
	});
}

/** @param {Stack} stack */
async function browser({ onStop }) {
	const chromium = await findChromium();
	const cluster = await startCluster({ throwaway: true });
	onStop(cluster.stop);
	await prepareDatabase(cluster.ownerUrl);
	const { release } = await ensureBuild();
	onStop(release);
	const port = await freePort();
	const origin = `http://localhost:${port}`;
	const server = await startServer({
		args: ['build/index.js'],
		env: {
			...process.env,
			NODE_ENV: 'production',
			HOST: '127.0.0.1',
			PORT: String(port),
			ORIGIN: origin,
			BODY_SIZE_LIMIT: '6M',
			SHUTDOWN_TIMEOUT: '2',
			HAIRSBREADTH_DATABASE_URL: cluster.url,
			HAIRSBREADTH_DURABILITY: 'throwaway',
			HAIRSBREADTH_LOG_LEVEL: 'warn',
			HAIRSBREADTH_DEMO: '1',
			// Every test comes from the same address; the limit has tests of its own.
			HAIRSBREADTH_COMPUTE_SECONDS: '1000000'
		},
		healthUrl: `${origin}/api/v1/health`
	});
	onStop(server.stop);
	const workers = await keepWorkers({
		count: 1,
		args: BUILT_WORKER,
		env: {
			...process.env,
			NODE_ENV: 'production',
			HAIRSBREADTH_DATABASE_URL: cluster.url,
			HAIRSBREADTH_LOG_LEVEL: 'warn'
		}
	});
	onStop(workers.stop);
	const report = freshReport('browser');
	const { code } = await run(process.execPath, ['node_modules/@playwright/test/cli.js', 'test'], {
		...shown,
		env: {
			...shown.env,
			HAIRSBREADTH_TEST_ORIGIN: origin,
			HAIRSBREADTH_CHROMIUM: chromium,
			HAIRSBREADTH_BROWSER_REPORT: report
		}
	});
	return countReport(report, code);
}

/**
 * @param {string} name
 * @param {string[]} projects
 * @param {NodeJS.ProcessEnv} [environment]
 */
async function vitest(name, projects, environment = {}) {
	const report = freshReport(name);
	const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
	const { code } = await run(
		process.execPath,
		['node_modules/vitest/vitest.mjs', 'run', ...projects, ...reporters],
		{ ...shown, env: { ...shown.env, ...environment } }
	);
	return countReport(report, code);
}

/**
 * An old report must not speak for a run that wrote none.
 *
 * @param {string} name
 */
function freshReport(name) {
	const file = stateFile(`report-${name}.json`);
	rmSync(file, { force: true });
	return file;
}

await runStack(async (stack) => {
	const wanted = process.argv.slice(2);
	const unknown = wanted.filter((name) => !Object.hasOwn(STAGES, name));
	if (unknown.length > 0) {
		throw new LaunchError(
			`There is no stage ${unknown.join(', ')}; there are ${Object.keys(STAGES).join(', ')}.`
		);
	}
	await ensurePackages();

	/** @type {string[]} */
	const lines = [];
	const total = { passed: 0, failed: 0 };
	for (const [name, stage] of Object.entries(STAGES)) {
		if (wanted.length > 0 && !wanted.includes(name)) continue;
		console.log(`\n=== ${name} ===`);
		const counts = await stage(stack).catch((error) => {
			console.error(error instanceof LaunchError ? error.message : error);
			return countExit(1);
		});
		if (stack.interrupted()) throw new LaunchError('Interrupted.');
		total.passed += counts.passed;
		total.failed += counts.failed;
		lines.push(`${name.padEnd(10)}${counts.passed} passed, ${counts.failed} failed`);
	}
	if (total.failed > 0) process.exitCode = 1;
	stack.atEnd(() => console.log(`\n${lines.join('\n')}\n\n${total.passed} passed, ${total.failed} failed`));
}, 130);
