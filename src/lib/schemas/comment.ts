import { z } from 'zod';
import { lines } from './plain-text.ts';
import { CHOICES_MAX } from './study-limits.ts';

/** A comment on a study: on the whole, on one choice, or at one separation. */
export const newComment = z.strictObject({
	text: lines(4000),
	choice: z
		.int()
		.min(0)
		.max(CHOICES_MAX - 1)
		.nullable()
		.default(null),
	separationNm: z.number({ error: 'a separation in nm' }).positive().max(1e6).nullable().default(null)
});

export interface StudyComment {
	id: string;
	by: string;
	text: string;
	choice: number | null;
	separationNm: number | null;
	at: string;
	resolved: { at: string; by: string } | null;
}

export type NewComment = z.infer<typeof newComment>;
