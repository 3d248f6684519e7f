import type { Transaction } from '../db/client.ts';
import { tell } from '../library/tell.ts';
import { studiesPinning } from './pins.ts';

/** Telling the owners of studies what became of a version that they rest on; their studies stay as they are. */

interface Step {
	ref: string;
	title: string;
	/** Name of who took it. */
	by: string;
	/** Account of who took it, who need not be told. */
	actorId: string;
}

export async function tellOfPublication(tx: Transaction, datasetId: string, step: Step): Promise<void> {
	for (const { id, name, ownerId, refs } of await studiesPinning(tx, datasetId)) {
		if (ownerId === step.actorId || refs.every((ref) => ref === step.ref)) continue;
		const { ref, title, by } = step;
		await tell(tx, [ownerId], { kind: 'study-input-published', ref, title, by, study: name, studyId: id });
	}
}

export async function tellOfWithdrawal(
	tx: Transaction,
	datasetId: string,
	{ reason, ...step }: Step & { reason: string }
): Promise<void> {
	for (const { id, name, ownerId, refs } of await studiesPinning(tx, datasetId)) {
		if (ownerId === step.actorId || !refs.includes(step.ref)) continue;
		const { ref, title, by } = step;
		await tell(tx, [ownerId], {
			kind: 'study-input-withdrawn',
			ref,
			title,
			by,
			reason,
			study: name,
			studyId: id
		});
	}
}
