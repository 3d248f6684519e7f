/** `npm run audit:verify`: follows the chain of the audit trail from its first row and says where it breaks, if it does. */
import postgres from 'postgres';
import { ownerDatabase } from './owner-database.mjs';

const database = await ownerDatabase();
const sql = postgres(database.url, { max: 1, onnotice: () => undefined });
try {
	const [{ broken, rows, last }] = await sql`
		select audit_chain_break() as broken, (select count(*)::int from audit_entry) as rows,
			(select hash from audit_entry order by id desc limit 1) as last`;
	if (broken === null) {
		console.log(`${rows} rows, each fits the one before it. The last seal is ${last ?? 'none'}.`);
	} else {
		console.error(`Row ${broken} does not fit: the trail was changed there or a row before it is missing.`);
		process.exitCode = 1;
	}
} finally {
	await sql.end({ timeout: 5 });
	await database.stop();
}
