import { spawnSync } from 'node:child_process';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** `npm run bench`: times the engine on one core and prints a table. */
const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
const { status } = spawnSync(
	process.execPath,
	['--import', 'tsx', join('tests', 'bench', 'engine.bench.ts')],
	{
		cwd: root,
		stdio: 'inherit'
	}
);
process.exitCode = status ?? 1;
