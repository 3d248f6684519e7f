/** Prints a token of a demo account and nothing else; started by src/launch/demo-token.mjs with the database's address. */
import { parseArgs } from 'node:util';
import { role as roleShape } from '../../schemas/person.ts';
import { closeDatabase } from '../db/client.ts';
import { seedDemo } from './seed.ts';
import { demoToken } from './token.ts';

const { values } = parseArgs({
	options: { role: { type: 'string' }, second: { type: 'boolean', default: false } }
});
const role = roleShape.safeParse(values.role);
if (!role.success) {
	console.error(
		'Say which: npm run -s demo:token -- --role reader|researcher|curator|administrator [--second]'
	);
	process.exitCode = 2;
} else {
	try {
		await seedDemo();
		console.log(await demoToken(role.data, values.second));
	} catch (error) {
		console.error(error instanceof Error ? error.message : String(error));
		process.exitCode = 1;
	} finally {
		await closeDatabase();
	}
}
