import { z } from 'zod';
import { equilibrium, forcePoint, warning } from './force-answer.ts';
import { line } from './plain-text.ts';

/** A record: a study as it was frozen, with everything that recomputing it takes. */

export const RECORD_FORMAT = 'hairsbreadth record 1';

export const recordVisibility = z.enum(['private', 'group', 'signed-in', 'everybody'], {
	error: 'private, group, signed-in or everybody'
});

export const freezeFields = z.strictObject({
	/** The state that is frozen; another one that was saved meanwhile is told. */
	revision: z.int().min(1),
	authors: z.array(line(200)).min(1, 'name at least one author').max(40),
	visibility: recordVisibility.default('private')
});

const checksum = z.string().regex(/^sha256:[0-9a-f]{64}$/);

export const recordVersion = z.object({
	ref: z.string(),
	/** Of the canonical JSON of its model. */
	checksum,
	title: z.string(),
	material: z.string(),
	quality: z.enum(['checked', 'provisional']),
	/** How it is cited, its sources included. */
	citation: z.string()
});

export const recordChoice = z.object({
	letter: z.string(),
	name: z.string(),
	reason: z.string(),
	/** As it is asked of POST /api/v1/forces: pinned versions and a list of separations. */
	request: z.record(z.string(), z.unknown()),
	/** Of the canonical JSON of the request with each version replaced by its model. */
	inputChecksum: checksum,
	points: z.array(forcePoint),
	equilibria: z.array(equilibrium),
	warnings: z.array(warning)
});

export const recordContent = z.object({
	format: z.literal(RECORD_FORMAT),
	name: z.string(),
	/** The arrangement as a sentence. */
	title: z.string(),
	authors: z.array(z.string()),
	group: z.string().nullable(),
	frozenAt: z.iso.datetime(),
	/** Of the study that was frozen. */
	study: z.object({ id: z.uuid(), revision: z.int() }),
	notes: z.string(),
	/** The study as the query of an address, with the reader's range and hairline. */
	query: z.string(),
	engine: z.string(),
	runtime: z.string(),
	versions: z.array(recordVersion),
	choices: z.array(recordChoice).min(1)
});

export type RecordContent = z.infer<typeof recordContent>;
export type RecordChoice = z.infer<typeof recordChoice>;
export type RecordVersion = z.infer<typeof recordVersion>;
export type RecordVisibility = z.infer<typeof recordVisibility>;
export type FreezeFields = z.infer<typeof freezeFields>;

/** An input that is not as it was when the record was frozen. */
export const recordFlag = z.object({
	ref: z.string(),
	kind: z.enum(['withdrawn', 'superseded']),
	/** The reason of a withdrawal, or the version that came after. */
	words: z.string()
});

export const savedRecord = z
	.object({
		checksum: z.string().regex(/^[0-9a-f]{64}$/),
		visibility: recordVisibility,
		group: z.object({ slug: z.string(), name: z.string() }).nullable(),
		owner: z.string(),
		flags: z.array(recordFlag),
		content: recordContent
	})
	.meta({ id: 'Record' });

export type SavedRecord = z.infer<typeof savedRecord>;
export type RecordFlag = z.infer<typeof recordFlag>;

const comparedQuantity = z.object({
	letter: z.string(),
	quantity: z.string(),
	separationNm: z.number(),
	frozen: z.number(),
	now: z.number(),
	/** Of the two values, over the sum of their bounds; above 1 they contradict each other. */
	overBounds: z.number()
});

export const recomputation = z
	.object({
		identical: z.boolean(),
		/** Numbers that were compared. */
		compared: z.int(),
		differing: z.int(),
		/** Largest difference over the sum of both bounds; null where all numbers are identical. */
		largest: comparedQuantity.nullable(),
		frozenWith: z.object({ engine: z.string(), runtime: z.string() }),
		computedWith: z.object({ engine: z.string(), runtime: z.string() }),
		at: z.iso.datetime()
	})
	.meta({ id: 'Recomputation' });

export type Recomputation = z.infer<typeof recomputation>;

export const recordQuery = z.object({
	search: z.string().trim().max(200).default(''),
	show: z.enum(['mine', 'group', 'open']).default('mine'),
	cursor: z.string().max(400).optional()
});
export type RecordQuery = z.infer<typeof recordQuery>;

export interface RecordSummary {
	checksum: string;
	name: string;
	owner: string;
	group: string | null;
	visibility: RecordVisibility;
	frozenAt: string;
	/** Versions that were withdrawn since. */
	withdrawn: number;
}
