import { and, eq, sql } from 'drizzle-orm';
import type { VersionState } from '../../schemas/version.ts';
import { appendAudit } from '../audit/append.ts';
import type { Transaction } from '../db/client.ts';
import { version } from '../db/schema/dataset.ts';
import { Conflict, NotFound, StateError } from '../errors.ts';

/** The life of a version: the allowed steps, from where to where. The database refuses every other one. */
export const STEPS = {
	submit: { from: 'draft', to: 'in_review' },
	return: { from: 'in_review', to: 'draft' },
	publish: { from: 'in_review', to: 'published' },
	withdraw: { from: 'published', to: 'withdrawn' }
} as const satisfies Record<string, { from: VersionState; to: VersionState }>;

export type Step = keyof typeof STEPS;

export interface StepRequest {
	versionId: string;
	/** Of the content that the actor saw; a changed draft is refused. */
	checksum: string;
	actor: string;
	reason?: string;
	now: Date;
}

/** What each step writes beside the state. */
function fieldsOf(step: Step, { actor, reason, now }: StepRequest) {
	switch (step) {
		case 'submit':
			return { submittedAt: now, submittedBy: actor };
		case 'return':
			return { submittedAt: null, submittedBy: null };
		case 'publish':
			return { publishedAt: now, publishedBy: actor };
		case 'withdraw':
			return { withdrawnAt: now, withdrawnBy: actor, withdrawnReason: reason ?? '' };
	}
}

/** Takes one step inside the caller's transaction, with its audit row. Two at once: the second finds the state moved on. */
export async function takeStep(tx: Transaction, step: Step, request: StepRequest): Promise<void> {
	const { from, to } = STEPS[step];
	const [current] = await tx
		.select({ state: version.state, checksum: version.checksum })
		.from(version)
		.where(eq(version.id, request.versionId))
		.for('update');
	if (!current) throw new NotFound('There is no such version.');
	if (current.state !== from)
		throw new StateError(
			`The version is ${current.state.replace('_', ' ')}; to ${step} it must be ${from.replace('_', ' ')}.`
		);
	if (current.checksum !== request.checksum)
		throw new Conflict('The version has changed since you saw it. Look at it again and repeat.');
	await tx
		.update(version)
		.set({ state: to, ...fieldsOf(step, request) })
		.where(and(eq(version.id, request.versionId), eq(version.state, sql`${from}`)));
	await appendAudit(tx, {
		actor: request.actor,
		action: `version.${step}`,
		objectType: 'version',
		objectId: request.versionId,
		fromState: from,
		toState: to,
		details: { checksum: request.checksum, ...(request.reason ? { reason: request.reason } : {}) }
	});
}
