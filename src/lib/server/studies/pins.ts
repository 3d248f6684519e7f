import { and, eq, inArray, isNull, sql } from 'drizzle-orm';
import { decodeStudy } from '../../schemas/study-address.ts';
import { versionsOf } from '../../schemas/study-slots.ts';
import type { Executor, Transaction } from '../db/client.ts';
import { dataset, version } from '../db/schema/dataset.ts';
import { study, studyPin } from '../db/schema/study.ts';
import { PUBLIC_STATES } from '../library/viewer.ts';
import { partsOf } from '../library/versions.ts';

/** The exact versions that a study rests on, kept beside it so that a new one finds whom it concerns. */

/** Versions that the query names, each once. */
export const refsIn = (query: string): string[] => versionsOf(decodeStudy(new URLSearchParams(query)).study);

/** Brings the pins to what the query names now; what the library does not have is not pinned. */
export async function pin(tx: Transaction, studyId: string, query: string): Promise<void> {
	const ids = await versionIds(tx, refsIn(query));
	await tx.delete(studyPin).where(eq(studyPin.studyId, studyId));
	if (ids.length > 0) await tx.insert(studyPin).values(ids.map((versionId) => ({ studyId, versionId })));
}

async function versionIds(tx: Transaction, refs: readonly string[]): Promise<string[]> {
	const parts = refs.flatMap((ref) => partsOf(ref) ?? []);
	if (parts.length === 0) return [];
	const rows = await tx
		.select({ id: version.id, slug: dataset.slug, major: version.major, minor: version.minor })
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.where(
			and(
				inArray(
					dataset.slug,
					parts.map(({ slug }) => slug)
				),
				inArray(version.state, PUBLIC_STATES)
			)
		);
	return rows
		.filter((row) =>
			parts.some(({ slug, major, minor }) => slug === row.slug && major === row.major && minor === row.minor)
		)
		.map(({ id }) => id);
}

export interface PinningStudy {
	id: string;
	name: string;
	ownerId: string;
	query: string;
	/** Versions of the dataset that it names. */
	refs: string[];
}

/** Studies in use that rest on any version of the dataset. */
export async function studiesPinning(
	executor: Executor,
	datasetId: string,
	limit = 1000
): Promise<PinningStudy[]> {
	const rows = await executor
		.select({
			id: study.id,
			name: study.name,
			ownerId: study.ownerId,
			query: study.query,
			refs: sql<string[]>`array_agg(${dataset.slug} || '@' || ${version.major} || '.' || ${version.minor})`
		})
		.from(studyPin)
		.innerJoin(study, eq(studyPin.studyId, study.id))
		.innerJoin(version, eq(studyPin.versionId, version.id))
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.where(and(eq(version.datasetId, datasetId), isNull(study.archivedAt)))
		.groupBy(study.id)
		.orderBy(study.savedAt)
		.limit(limit);
	return rows;
}
