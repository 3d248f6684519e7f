import type postgres from 'postgres';

/** Drafts and their steps by plain SQL, for tests of what the database itself holds. */

interface DraftChoices {
	dataset?: string;
	major?: number;
	sources?: string[];
	checks?: { severity: string; answer: string | null }[];
}

let last = 100;

/** A small draft with its audit row. Returns its id. */
export async function aDraft(
	sql: postgres.Sql,
	{
		dataset = 'gold-drude',
		major = ++last,
		sources = ['ordal-1985'],
		checks = [{ severity: 'info', answer: null }]
	}: DraftChoices = {}
): Promise<string> {
	return sql.begin(async (tx) => {
		const [{ id }] = await tx`
			insert into version (dataset_id, major, minor, quality, quality_reason, kind, model, checksum, fingerprint,
				conducts, created_by)
			select id, ${major}, 0, 'provisional', 'a test', 'model', '{"kind":"plasma","plasmaEnergyEv":9}'::jsonb,
				'sha256:' || repeat('a', 64), 'sha256:' || repeat('b', 64), true, 'researcher@larkmoor.example'
			from dataset where slug = ${dataset}
			returning id`;
		for (const [position, slug] of sources.entries())
			await tx`insert into version_source select ${id}, id, ${position} from source where slug = ${slug}`;
		for (const [position, { severity, answer }] of checks.entries())
			await tx`insert into check_result values (${id}, ${`check-${position}`}, ${position}, ${severity}, 'A sentence.', 1, 2, ${answer})`;
		await audit(tx, id, null, 'draft', 'researcher@larkmoor.example');
		return id as string;
	});
}

type State = 'draft' | 'in_review' | 'published' | 'withdrawn';

/** Takes a step with its audit row, whether or not it is allowed. */
export async function move(
	sql: postgres.Sql,
	id: string,
	to: State,
	actor = `${to}@larkmoor.example`
): Promise<void> {
	await sql.begin(async (tx) => {
		const [{ state }] = await tx`select state from version where id = ${id} for update`;
		const fields = {
			draft: tx`submitted_at = null, submitted_by = null`,
			in_review: tx`submitted_at = now(), submitted_by = ${actor}`,
			published: tx`published_at = now(), published_by = ${actor}`,
			withdrawn: tx`withdrawn_at = now(), withdrawn_by = ${actor}, withdrawn_reason = 'a test'`
		};
		await tx`update version set state = ${to}, ${fields[to]} where id = ${id}`;
		await audit(tx, id, state as string, to, actor);
	});
}

async function audit(
	tx: postgres.TransactionSql,
	id: string,
	from: string | null,
	to: string,
	actor: string
): Promise<void> {
	await tx`insert into audit_entry (actor, action, object_type, object_id, from_state, to_state, details)
		values (${actor}, 'version.test', 'version', ${id}, ${from}, ${to}, '{}')`;
}
