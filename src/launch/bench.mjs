import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'vite';

/**
 * `npm run bench`: times the engine on one core and prints a table; `-- --against` also times a nested quadrature, `-- --workers`
 * times screenings by worker processes instead. The
 * engine is bundled first, as it is for the server: what a loader puts around every module would be timed otherwise.
 */
if (process.argv.includes('--workers')) {
	const { benchWorkers } = await import('./bench-workers.mjs');
	await benchWorkers();
}
const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
const folder = mkdtempSync(join(tmpdir(), 'hairsbreadth-bench-'));
try {
	await build({
		configFile: false,
		root,
		publicDir: false,
		logLevel: 'error',
		build: {
			ssr: true,
			outDir: folder,
			emptyOutDir: true,
			rollupOptions: {
				input: join('tests', 'bench', 'engine.bench.ts'),
				output: { format: 'es', entryFileNames: 'bench.mjs' }
			}
		}
	});
	const { status } = spawnSync(process.execPath, [join(folder, 'bench.mjs'), ...process.argv.slice(2)], {
		cwd: root,
		stdio: 'inherit'
	});
	process.exitCode = status ?? 1;
} finally {
	rmSync(folder, { recursive: true, force: true });
}
