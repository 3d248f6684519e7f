import { z } from 'zod';

/** What a version under review would do to studies that rest on its dataset. */

export const forceChange = z.object({
	arrangement: z.string(),
	points: z.array(
		z.object({
			separationNm: z.number(),
			fromPa: z.number().nullable(),
			toPa: z.number(),
			percent: z.number().nullable(),
			signChanges: z.boolean(),
			beyondBound: z.boolean()
		})
	),
	largestPercent: z.number().nullable(),
	signChanges: z.boolean()
});

export const studyImpact = z.object({
	/** Null where whoever asks may not see the study. */
	study: z.object({ id: z.string(), name: z.string() }).nullable(),
	/** One for each of its model choices that the dataset is part of. */
	changes: z.array(forceChange)
});
export type StudyImpact = z.infer<typeof studyImpact>;

/** The lines of the stream that the review page reads: how many there are, then each. */
export const impactLine = z.union([
	z.object({ of: z.int() }),
	z.object({ done: z.int(), impact: studyImpact })
]);

/** Sign changes before anything else, then the largest change. */
export function byImpact(a: StudyImpact, b: StudyImpact): number {
	const turns = ({ changes }: StudyImpact) => Number(changes.some(({ signChanges }) => signChanges));
	const largest = ({ changes }: StudyImpact) =>
		Math.max(0, ...changes.map(({ largestPercent }) => largestPercent ?? 0));
	return turns(b) - turns(a) || largest(b) - largest(a);
}
