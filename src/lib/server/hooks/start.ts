import { checkServing, config } from '../config.ts';
import { checkDatabase } from '../limits/database.ts';
import { log } from '../log.ts';

/**
 * Looks at what a later failure would be traced back to, before the first person is served.
 *
 * @throws Error that says what to put right
 */
export async function checkStart(environment: NodeJS.ProcessEnv): Promise<void> {
	const { durability, threads } = config();
	if (environment.NODE_ENV === 'production') checkServing(environment);
	await checkDatabase(durability);
	log().info({ threads, durability, node: process.version }, 'started');
}
