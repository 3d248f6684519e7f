import { config } from '../config.ts';
import { prepareQueue } from '../jobs/queue.ts';
import { seedLibrary } from '../library/seed.ts';
import { connect } from './client.ts';
import { migrate } from './migrate.ts';

/**
 * Run before the application starts: migrates, then loads the seed. HAIRSBREADTH_DATABASE_URL signs in as the owner of
 * the tables here; the application itself runs as a role that cannot touch tables or triggers.
 */
const { databaseUrl } = config();

await migrate(databaseUrl);
await prepareQueue(databaseUrl);
const { database, close } = connect(databaseUrl, 1);
try {
	const { written, unchanged } = await seedLibrary(database, 'data-seed');
	console.log(
		written > 0
			? `Library: ${written} parts of the seed loaded, ${unchanged} were there.`
			: `Library: up to date (${unchanged} parts).`
	);
} finally {
	await close();
}
