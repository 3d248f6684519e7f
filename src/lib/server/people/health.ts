import { and, desc, eq, sql } from 'drizzle-orm';
import { statfs } from 'node:fs/promises';
import { auditChainBreak } from '../audit/append.ts';
import { database } from '../db/client.ts';
import { auditEntry } from '../db/schema/audit.ts';
import { countByState } from '../outbox/list.ts';
import type { SignedIn } from '../../schemas/person.ts';
import { requireAdministrator } from './rights.ts';

/** How the installation is: a line each, with a figure and a verdict. */

export interface HealthLine {
	name: string;
	/** A sentence with its figure. */
	text: string;
	good: boolean;
}

const DISK_LEAST = 0.1;
const CLOCK_MS_MOST = 2000;
const BACKUP_DAYS_MOST = 2;
const GIGABYTE = 1e9;

export async function health(actor: SignedIn): Promise<HealthLine[]> {
	requireAdministrator(actor);
	return Promise.all([
		databaseLine(),
		durabilityLine(),
		clockLine(),
		diskLine(),
		mailLine(),
		queueLine(),
		chainLine(),
		backupLine()
	]);
}

async function databaseLine(): Promise<HealthLine> {
	const [row] = await database().execute<{ version: string; size: string }>(
		sql`select current_setting('server_version') as version, pg_database_size(current_database()) as size`
	);
	const size = (Number(row.size) / GIGABYTE).toFixed(3);
	return { name: 'Database', text: `PostgreSQL ${row.version} answers; it holds ${size} GB.`, good: true };
}

async function durabilityLine(): Promise<HealthLine> {
	const [row] = await database().execute<{ off: string | null }>(sql`
		select string_agg(name, ', ') as off
		from unnest(array['fsync', 'full_page_writes', 'synchronous_commit', 'data_checksums']) as name
		where current_setting(name) <> 'on'`);
	return row.off === null
		? { name: 'Durability', text: 'What is committed survives a crash; pages are checksummed.', good: true }
		: { name: 'Durability', text: `A crash could lose work: ${row.off} off.`, good: false };
}

async function clockLine(): Promise<HealthLine> {
	const before = Date.now();
	const [row] = await database().execute<{ now: string }>(
		sql`select extract(epoch from clock_timestamp()) * 1000 as now`
	);
	const off = Math.round(Number(row.now) - (before + Date.now()) / 2);
	return {
		name: 'Clock',
		text: `The clocks of application and database differ by ${Math.abs(off)} ms.`,
		good: Math.abs(off) <= CLOCK_MS_MOST
	};
}

async function diskLine(): Promise<HealthLine> {
	const { bavail, blocks, bsize } = await statfs('.');
	const free = bavail / blocks;
	return {
		name: 'Disk',
		text: `${((bavail * bsize) / GIGABYTE).toFixed(1)} GB are free where the application runs (${Math.round(free * 100)} %).`,
		good: free >= DISK_LEAST
	};
}

/** Screenings that should be under way, and whether anything came of it lately. */
const QUEUE_SECONDS_MOST = 60;

async function queueLine(): Promise<HealthLine> {
	const [row] = await database().execute<{ live: number; chunks: number; idle: number | null }>(sql`
		select count(*)::int as live, coalesce(sum(chunks - chunks_done), 0)::int as chunks,
			extract(epoch from now() - max(greatest(created_at, coalesce(
				(select max(done_at) from screening_chunk where screening_id = screening.id), created_at))))::float as idle
		from screening where state in ('queued', 'running')`);
	if (row.live === 0) return { name: 'Screenings', text: 'Nothing waits for a worker.', good: true };
	const text = `${row.live} under way, ${row.chunks} chunks to go; the last one ended ${Math.round(row.idle ?? 0)} s ago.`;
	const good = (row.idle ?? 0) <= QUEUE_SECONDS_MOST;
	return { name: 'Screenings', text: good ? text : `${text} Is a worker running?`, good };
}

async function mailLine(): Promise<HealthLine> {
	const { waiting, sent, failed } = await countByState();
	return {
		name: 'Mail',
		text: `${waiting} waiting, ${sent} sent, ${failed} given up.`,
		good: failed === 0
	};
}

async function chainLine(): Promise<HealthLine> {
	const broken = await auditChainBreak(database());
	return broken === null
		? { name: 'Audit trail', text: 'Every row fits the one before it.', good: true }
		: { name: 'Audit trail', text: `Row ${broken} does not fit: the trail was tampered with.`, good: false };
}

async function backupLine(): Promise<HealthLine> {
	const [last] = await database()
		.select({ at: auditEntry.at })
		.from(auditEntry)
		.where(and(eq(auditEntry.objectType, 'installation'), eq(auditEntry.objectId, 'backup')))
		.orderBy(desc(auditEntry.id))
		.limit(1);
	if (!last) return { name: 'Backup', text: 'None was made yet: npm run backup.', good: false };
	const days = (Date.now() - last.at.getTime()) / (24 * 3_600_000);
	return {
		name: 'Backup',
		text: `The last one is of ${last.at.toISOString().slice(0, 16).replace('T', ' ')} UTC.`,
		good: days <= BACKUP_DAYS_MOST
	};
}
