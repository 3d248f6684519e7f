import { sql } from 'drizzle-orm';
import type { Transaction } from '../db/client.ts';

export interface AuditStep {
	/** Who did it: an account, or INSTALLATION. */
	actor: string;
	/** Noun and verb, as `version.publish`. */
	action: string;
	objectType: string;
	objectId: string;
	fromState?: string | null;
	toState?: string | null;
	details?: Record<string, unknown>;
}

/** What the seed and the set-up act as; no person has this name. */
export const INSTALLATION = 'installation';

/** Writes one row of the trail. Number, time, transaction and hash are the database's to fill in. */
export async function appendAudit(tx: Transaction, step: AuditStep): Promise<void> {
	await tx.execute(sql`
		insert into audit_entry (actor, action, object_type, object_id, from_state, to_state, details)
		values (${step.actor}, ${step.action}, ${step.objectType}, ${step.objectId},
			${step.fromState ?? null}, ${step.toState ?? null}, ${JSON.stringify(step.details ?? {})}::jsonb)`);
}

/** Number of the first entry whose seal or link does not fit; null where the chain is whole. */
export async function auditChainBreak(executor: Pick<Transaction, 'execute'>): Promise<number | null> {
	const [row] = await executor.execute<{ broken: string | null }>(sql`select audit_chain_break() as broken`);
	return row.broken === null ? null : Number(row.broken);
}
