/**
 * `npm run -s demo:token -- --role curator [--second]`: prints one token of a demo account and nothing else. Uses the
 * database of this checkout, or the one of HAIRSBREADTH_DATABASE_URL.
 */
import { spawn } from 'node:child_process';
import { openDatabase } from './database.mjs';

const say = console.log;
// What the start of the database says belongs to the eye, not into the token.
console.log = console.error;
const database = await openDatabase();
console.log = say;
try {
	const code = await new Promise((resolve) => {
		const args = ['--import', 'tsx', 'src/lib/server/demo/print-token.ts', ...process.argv.slice(2)];
		const child = spawn(process.execPath, args, {
			stdio: 'inherit',
			env: {
				...process.env,
				HAIRSBREADTH_DATABASE_URL: database.url,
				HAIRSBREADTH_DEMO: '1',
				HOST: '127.0.0.1'
			}
		});
		child.once('close', resolve);
		child.once('error', () => resolve(1));
	});
	process.exitCode = Number(code);
} finally {
	await database.stop();
}
