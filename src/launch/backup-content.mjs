/** What a backup says about its own content, so that a restore can be held against it. */

/**
 * @typedef {object} Content
 * @property {Record<string, { rows: number, sha256: string }>} tables by schema and name
 * @property {{ rows: number, lastHash: string | null, whole: boolean }} auditTrail
 */

/**
 * @typedef {object} Manifest
 * @property {1} format
 * @property {string} made when, in UTC
 * @property {string} server version of PostgreSQL
 * @property {{ file: string, bytes: number, sha256: string }} dump
 * @property {Content} content
 */

/**
 * Counts and checksums over all rows, as this transaction sees them.
 *
 * @param {import('postgres').ReservedSql | import('postgres').TransactionSql} sql
 * @returns {Promise<Content>}
 */
export async function readContent(sql) {
	// The text of a row depends on these; they are the same on both sides.
	await sql`select set_config('timezone', 'UTC', true), set_config('datestyle', 'ISO, YMD', true),
		set_config('intervalstyle', 'postgres', true), set_config('bytea_output', 'hex', true),
		set_config('extra_float_digits', '1', true)`;
	const names = await sql`
		select schemaname as schema, tablename as name from pg_tables
		where schemaname in ('public', 'drizzle') order by 1, 2`;
	/** @type {Content['tables']} */
	const tables = {};
	for (const { schema, name } of names) {
		const [row] = await sql`
			select count(*)::int as rows,
				encode(sha256(convert_to(coalesce(string_agg(hash, '' order by hash), ''), 'UTF8')), 'hex') as sha256
			from (select md5(one::text) as hash from ${sql(schema)}.${sql(name)} as one) as hashes`;
		tables[`${schema}.${name}`] = { rows: row.rows, sha256: row.sha256 };
	}
	const [trail] = await sql`
		select count(*)::int as rows, (select hash from audit_entry order by id desc limit 1) as last,
			audit_chain_break() is null as whole
		from audit_entry`;
	return { tables, auditTrail: { rows: trail.rows, lastHash: trail.last, whole: trail.whole } };
}

/**
 * Where two contents differ, a sentence each.
 *
 * @param {Content} wanted
 * @param {Content} found
 */
export function differences(wanted, found) {
	const names = new Set([...Object.keys(wanted.tables), ...Object.keys(found.tables)]);
	const different = [...names].flatMap((name) => {
		const [one, other] = [wanted.tables[name], found.tables[name]];
		if (!one || !other) return [`${name} is ${one ? 'missing' : 'one too many'}.`];
		if (one.rows !== other.rows) return [`${name} has ${other.rows} rows instead of ${one.rows}.`];
		return one.sha256 === other.sha256 ? [] : [`${name} has other content.`];
	});
	if (!found.auditTrail.whole) different.push('The chain of the audit trail is broken.');
	if (wanted.auditTrail.lastHash !== found.auditTrail.lastHash) {
		different.push('The audit trail ends with another row.');
	}
	return different;
}
