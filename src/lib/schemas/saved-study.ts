import { z } from 'zod';
import { CHOICES_MAX } from './study-limits.ts';
import { line } from './plain-text.ts';

/** A study as it is kept: its address, a name, notes, and who may see it. */

export const visibility = z.enum(['private', 'group', 'signed-in'], {
	error: 'private, group or signed-in'
});

const query = z
	.string()
	.max(20_000)
	.regex(/^\?[\x20-\x7e]*$/, 'the query of a study’s address, which begins with ?');
const notes = z
	.string()
	.max(20_000)
	.regex(/^(?:[^\p{Cc}\p{Cs}]|[\n\r\t])*$/u, 'no control characters');
const reasons = z
	.array(
		z
			.string()
			.trim()
			.max(500)
			.regex(/^(?:[^\p{Cc}\p{Cs}]|[\n\r\t])*$/u, 'no control characters')
	)
	.max(CHOICES_MAX);

export const newStudy = z.strictObject({
	name: line(200),
	query,
	notes: notes.default(''),
	reasons: reasons.default([]),
	visibility: visibility.default('private'),
	/** Slug of a group of one's own; needed where the group may see it. */
	group: z.string().max(80).nullable().default(null)
});

/** What was typed since `revision`; the rest stays. */
export const studyChange = z.strictObject({
	revision: z.int().min(1),
	name: line(200).optional(),
	query: query.optional(),
	notes: notes.optional(),
	reasons: reasons.optional(),
	visibility: visibility.optional(),
	group: z.string().max(80).nullable().optional(),
	archived: z.boolean().optional()
});

export const savedStudy = z
	.object({
		id: z.uuid(),
		name: z.string(),
		query: z.string(),
		notes: z.string(),
		reasons: z.array(z.string()),
		owner: z.string(),
		group: z.object({ slug: z.string(), name: z.string() }).nullable(),
		visibility,
		revision: z.int(),
		savedAt: z.iso.datetime(),
		savedBy: z.string(),
		archived: z.boolean(),
		/** Names of the versions that it rests on. */
		versions: z.array(z.string())
	})
	.meta({ id: 'Study' });

/** How long a link may stand, in days. */
export const linkDays = z.coerce.number().int().min(1, 'one day at least').max(365, 'a year at most');

export interface StudyLink {
	id: string;
	by: string;
	createdAt: string;
	expiresAt: string;
	state: 'open' | 'run out' | 'taken back';
}

export const studyQuery = z.object({
	search: z.string().trim().max(200).default(''),
	show: z.enum(['mine', 'group', 'shared', 'archived']).default('mine'),
	sort: z.enum(['saved', 'name']).default('saved'),
	cursor: z.string().max(400).optional()
});

export type Visibility = z.infer<typeof visibility>;
export type NewStudy = z.infer<typeof newStudy>;
export type StudyChange = z.infer<typeof studyChange>;
export type SavedStudy = z.infer<typeof savedStudy>;
export type StudyQuery = z.infer<typeof studyQuery>;
