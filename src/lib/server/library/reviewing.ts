import { and, asc, desc, eq, inArray, or, sql } from 'drizzle-orm';
import type { ForceChange, ModelDifference } from '../../schemas/comparison.ts';
import type { SignedIn } from '../../schemas/person.ts';
import type { VersionDetail } from '../../schemas/version.ts';
import { database } from '../db/client.ts';
import { dataset, version } from '../db/schema/dataset.ts';
import { material } from '../db/schema/material.ts';
import { usualForceChanges } from './force-change.ts';
import { modelDifference } from './model-difference.ts';
import { nameOf } from './read-versions.ts';
import * as versions from './versions.ts';
import type { Viewer } from './viewer.ts';

/** What waits for a review, and what a reviewer sees of it. */

export interface Waiting {
	ref: string;
	title: string;
	state: 'draft' | 'in_review';
	by: string;
	/** Made or submitted by whoever looks: somebody else has to review it. */
	own: boolean;
	at: string;
	note: string | null;
	warnings: number;
}

const QUEUE_MAX = 200;

/** Longest waiting first: what was submitted by anybody, and the own drafts. */
export async function queue(actor: SignedIn): Promise<Waiting[]> {
	const rows = await database()
		.select({
			slug: dataset.slug,
			title: dataset.title,
			material: material.name,
			major: version.major,
			minor: version.minor,
			state: version.state,
			note: version.note,
			by: nameOf(version.createdBy),
			createdBy: version.createdBy,
			submittedBy: version.submittedBy,
			submittedAt: version.submittedAt,
			createdAt: version.createdAt,
			warnings: sql<number>`(select count(*)::int from check_result
				where check_result.version_id = ${version.id} and check_result.severity = 'warn')`
		})
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.innerJoin(material, eq(dataset.materialId, material.id))
		.where(
			or(eq(version.state, 'in_review'), and(eq(version.state, 'draft'), eq(version.createdBy, actor.id)))
		)
		.orderBy(desc(version.state), asc(sql`coalesce(${version.submittedAt}, ${version.createdAt})`))
		.limit(QUEUE_MAX);
	return rows.map((row) => ({
		ref: versions.refOf(row.slug, `${row.major}.${row.minor}`),
		title: `${row.material}: ${row.title}`,
		state: row.state as Waiting['state'],
		by: row.by ?? 'somebody',
		own: row.createdBy === actor.id || row.submittedBy === actor.id,
		at: (row.submittedAt ?? row.createdAt).toISOString(),
		note: row.note,
		warnings: row.warnings
	}));
}

/** How many versions wait that this person may review. */
export async function waitingFor(personId: string): Promise<number> {
	const [{ count }] = await database()
		.select({ count: sql<number>`count(*)::int` })
		.from(version)
		.where(
			sql`${version.state} = 'in_review' and ${version.createdBy} <> ${personId} and ${version.submittedBy} <> ${personId}`
		);
	return count;
}

export interface Candidate {
	version: VersionDetail;
	/** Whether whoever looks made or submitted it. */
	own: boolean;
	by: string;
	submittedAt: string | null;
	/** What it takes the place of: its parent, else the newest published version of the dataset. */
	before: { ref: string; number: string } | null;
	difference: ModelDifference | null;
	changes: ForceChange[];
}

/** @throws NotFound where this person may not see it */
export async function candidate(actor: SignedIn, slug: string, number: string): Promise<Candidate> {
	const viewer: Viewer = { personId: actor.id, isCurator: actor.role === 'curator' };
	const found = await versions.get(slug, number, undefined, viewer);
	const [made] = await database()
		.select({
			by: nameOf(version.createdBy),
			createdBy: version.createdBy,
			submittedBy: version.submittedBy,
			submittedAt: version.submittedAt
		})
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.where(and(eq(dataset.slug, slug), eq(sql`${version.major} || '.' || ${version.minor}`, number)));
	const beforeNumber = found.parent ?? (await newestPublished(slug, number));
	const before = beforeNumber === null ? null : await versions.get(slug, beforeNumber);
	return {
		version: found,
		own: made.createdBy === actor.id || made.submittedBy === actor.id,
		by: made.by ?? 'somebody',
		submittedAt: made.submittedAt?.toISOString() ?? null,
		before: before && { ref: before.ref, number: before.number },
		difference: before && modelDifference(before.model, found.model),
		changes: await usualForceChanges(
			found.material.name.toLowerCase(),
			found.material.class,
			before?.model ?? null,
			found.model
		)
	};
}

async function newestPublished(slug: string, but: string): Promise<string | null> {
	const rows = await database()
		.select({ major: version.major, minor: version.minor })
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.where(and(eq(dataset.slug, slug), inArray(version.state, ['published'])))
		.orderBy(desc(version.major), desc(version.minor));
	const numbers = rows.map(({ major, minor }) => `${major}.${minor}`);
	return numbers.find((number) => number !== but) ?? null;
}
