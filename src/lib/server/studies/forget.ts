import { and, eq, inArray, notExists } from 'drizzle-orm';
import { appendAudit } from '../audit/append.ts';
import type { Transaction } from '../db/client.ts';
import { record } from '../db/schema/record.ts';
import { study, studyChange, studyComment, studyLink, studyPin } from '../db/schema/study.ts';

/** With an account go the studies that nobody else could see; shared ones stay under its name, and those with a record for good. */
export async function forgetStudies(tx: Transaction, personId: string): Promise<void> {
	const own = await tx
		.select({ id: study.id })
		.from(study)
		.where(
			and(
				eq(study.ownerId, personId),
				eq(study.visibility, 'private'),
				notExists(tx.select({ one: record.checksum }).from(record).where(eq(record.studyId, study.id)))
			)
		);
	const ids = own.map(({ id }) => id);
	if (ids.length === 0) return;
	await tx.delete(studyComment).where(inArray(studyComment.studyId, ids));
	await tx.delete(studyLink).where(inArray(studyLink.studyId, ids));
	await tx.delete(studyPin).where(inArray(studyPin.studyId, ids));
	await tx.delete(studyChange).where(inArray(studyChange.studyId, ids));
	await tx.delete(study).where(inArray(study.id, ids));
	for (const objectId of ids)
		await appendAudit(tx, { actor: personId, action: 'study.forget', objectType: 'study', objectId });
}
