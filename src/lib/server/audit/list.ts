import { and, desc, eq, gte, ilike, inArray, lt, or, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import { decodeCursor, page } from '../api/paginate.ts';
import { database } from '../db/client.ts';
import { auditEntry } from '../db/schema/audit.ts';
import { person } from '../db/schema/people.ts';
import { namesOf } from '../people/names.ts';
import { objectNames } from './object-names.ts';

/** Reading the trail: newest first, by who, what, on which object and when. */

const day = z.iso.date('a day reads 2026-03-31');

export const auditFilter = z.object({
	/** A name, an e-mail address, a number of an account, or "installation". */
	who: z.string().trim().max(200).default(''),
	/** The beginning of an action, as `version` or `version.publish`. */
	action: z
		.string()
		.trim()
		.max(60)
		.regex(/^[a-z.-]*$/, 'an action reads version.publish')
		.default(''),
	/** Its number, as the trail has it. */
	objectId: z.string().trim().max(200).default(''),
	from: z.union([z.literal(''), day]).default(''),
	to: z.union([z.literal(''), day]).default('')
});
export type AuditFilter = z.infer<typeof auditFilter>;

export interface AuditLine {
	id: number;
	at: string;
	actor: string;
	actorName: string | null;
	action: string;
	objectType: string;
	objectId: string;
	/** What the object is called today; null where it has no name or is gone. */
	objectName: string | null;
	fromState: string | null;
	toState: string | null;
	details: Record<string, unknown>;
	hash: string;
}

const PAGE = 100;
const MATCHES_MAX = 100;
const DAY_MS = 24 * 3_600_000;

export async function list(
	filter: AuditFilter,
	cursor?: string,
	limit = PAGE
): Promise<{ entries: AuditLine[]; next: string | null }> {
	const before = cursor === undefined ? undefined : decodeCursor(cursor, z.int());
	const rows = await database()
		.select()
		.from(auditEntry)
		.where(and(await conditionOf(filter), before === undefined ? undefined : lt(auditEntry.id, before)))
		.orderBy(desc(auditEntry.id))
		.limit(limit + 1);
	const shown = page(rows, limit, (row) => row.id);
	const [names, objects] = await Promise.all([
		namesOf(shown.rows.map(({ actor }) => actor)),
		objectNames(shown.rows)
	]);
	return {
		entries: shown.rows.map((row) => ({
			id: row.id,
			at: row.at.toISOString(),
			actor: row.actor,
			actorName: names.get(row.actor) ?? null,
			action: row.action,
			objectType: row.objectType,
			objectId: row.objectId,
			objectName: objects.get(row.objectId) ?? null,
			fromState: row.fromState,
			toState: row.toState,
			details: row.details,
			hash: row.hash
		})),
		next: shown.next
	};
}

async function conditionOf({ who, action, objectId, from, to }: AuditFilter): Promise<SQL | undefined> {
	return and(
		who ? inArray(auditEntry.actor, await actorsOf(who)) : undefined,
		action ? or(eq(auditEntry.action, action), ilike(auditEntry.action, `${action}.%`)) : undefined,
		objectId ? eq(auditEntry.objectId, objectId) : undefined,
		from ? gte(auditEntry.at, new Date(`${from}T00:00:00Z`)) : undefined,
		to ? lt(auditEntry.at, new Date(new Date(`${to}T00:00:00Z`).getTime() + DAY_MS)) : undefined
	);
}

async function actorsOf(who: string): Promise<string[]> {
	const pattern = `%${who.replace(/[\\%_]/g, '\\$&')}%`;
	const people = await database()
		.select({ id: person.id })
		.from(person)
		.where(or(ilike(person.name, pattern), ilike(person.email, pattern)))
		.limit(MATCHES_MAX);
	return [who, ...people.map(({ id }) => id)];
}
