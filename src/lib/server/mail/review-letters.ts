import { z } from 'zod';
import type { Written } from './letters.ts';

/** What is told about the life of a version; by mail and, in the same words, inside the application. */

const base = {
	/** slug@major.minor */
	ref: z.string(),
	/** Material and dataset, as "Gold: Johnson-Christy table". */
	title: z.string(),
	/** Name of who took the step. */
	by: z.string()
};

const shapes = {
	'review-wanted': z.object({ ...base, note: z.string().nullable() }),
	'version-returned': z.object({ ...base, reason: z.string() }),
	'version-published': z.object({ ...base, reason: z.string().nullable() }),
	'version-withdrawn': z.object({ ...base, reason: z.string() }),
	'study-input-published': z.object({ ...base, study: z.string(), studyId: z.string() }),
	'study-input-withdrawn': z.object({ ...base, reason: z.string(), study: z.string(), studyId: z.string() }),
	'study-comment': z.object({ by: z.string(), study: z.string(), studyId: z.string(), text: z.string() }),
	'study-mention': z.object({ by: z.string(), study: z.string(), studyId: z.string(), text: z.string() }),
	'study-given': z.object({ by: z.string(), study: z.string(), studyId: z.string() }),
	'screening-finished': z.object({ screening: z.string(), screeningId: z.string() })
};

export type ReviewLetterKind = keyof typeof shapes;

export type ReviewLetter = {
	[Kind in ReviewLetterKind]: { kind: Kind } & z.infer<(typeof shapes)[Kind]>;
}[ReviewLetterKind];

/** Told to owners of studies, who choose apart from reviewers whether they want mail of it. */
export const isAboutStudy = (kind: ReviewLetterKind): boolean => /^(study|screening)-/.test(kind);

export const isReviewLetter = (kind: string): kind is ReviewLetterKind => Object.hasOwn(shapes, kind);

/** `/reviews/gold-drude/2.0`: the pages of a version by what one does there. */
const pathOf = (folder: string, ref: string) => `${folder}/${ref.replace('@', '/')}`;
const versionPath = (ref: string) => `/datasets/${ref.replace('@', '/versions/')}`;

export function writeReviewLetter(kind: ReviewLetterKind, data: unknown, origin: string): Written {
	switch (kind) {
		case 'review-wanted': {
			const { ref, title, by, note } = shapes[kind].parse(data);
			return {
				subject: `${ref} waits for a review`,
				paragraphs: [
					`${by} submitted ${ref} (${title}). It is published once somebody else has looked at it.`,
					...(note === null ? [] : [note])
				],
				link: { text: 'Review it', href: `${origin}${pathOf('/reviews', ref)}` }
			};
		}
		case 'version-returned': {
			const { ref, title, by, reason } = shapes[kind].parse(data);
			return {
				subject: `${ref} came back from review`,
				paragraphs: [`${by} returned your ${ref} (${title}). The reason:`, reason],
				link: { text: 'Correct it', href: `${origin}${pathOf('/drafts', ref)}` }
			};
		}
		case 'version-published': {
			const { ref, title, by, reason } = shapes[kind].parse(data);
			return {
				subject: `${ref} is published`,
				paragraphs: [
					`${by} approved ${ref} (${title}), and it is published.`,
					...(reason === null ? [] : [reason])
				],
				link: { text: 'See the version', href: `${origin}${versionPath(ref)}` }
			};
		}
		case 'version-withdrawn': {
			const { ref, title, by, reason } = shapes[kind].parse(data);
			return {
				subject: `${ref} is withdrawn`,
				paragraphs: [
					`${by} withdrew ${ref} (${title}). The reason:`,
					reason,
					'Its address stays, says so, and what used it can be recomputed. New work should not use it.'
				],
				link: { text: 'See the version', href: `${origin}${versionPath(ref)}` }
			};
		}
		case 'study-input-published': {
			const { ref, title, by, study, studyId } = shapes[kind].parse(data);
			return {
				subject: `${ref} is new, and your study rests on an earlier version`,
				paragraphs: [
					`${by} published ${ref} (${title}). Your study "${study}" keeps the version that it names until you say otherwise.`,
					'Its page marks the revision and can show the change beside what you have.'
				],
				link: { text: 'Open the study', href: `${origin}/studies/${studyId}` }
			};
		}
		case 'study-input-withdrawn': {
			const { ref, title, by, reason, study, studyId } = shapes[kind].parse(data);
			return {
				subject: `${ref} is withdrawn, and your study rests on it`,
				paragraphs: [
					`${by} withdrew ${ref} (${title}), on which your study "${study}" rests. The reason:`,
					reason,
					'The study can still be computed as it was.'
				],
				link: { text: 'Open the study', href: `${origin}/studies/${studyId}` }
			};
		}
		case 'study-given': {
			const { by, study, studyId } = shapes[kind].parse(data);
			return {
				subject: `${by} gave you the study "${study}"`,
				paragraphs: [`You own it now: you decide who sees it, and you are told of what it rests on.`],
				link: { text: 'Open the study', href: `${origin}/studies/${studyId}` }
			};
		}
		case 'screening-finished': {
			const { screening, screeningId } = shapes[kind].parse(data);
			return {
				subject: `The screening "${screening}" has ended`,
				paragraphs: ['Every arrangement is computed, and the list is ranked.'],
				link: { text: 'See the result', href: `${origin}/screenings/${screeningId}` }
			};
		}
		case 'study-comment':
		case 'study-mention': {
			const { by, study, studyId, text } = shapes[kind].parse(data);
			const what = kind === 'study-mention' ? 'names you in a comment on' : 'commented on your study';
			return {
				subject: `${by} ${what} "${study}"`,
				paragraphs: [text],
				link: { text: 'Read the comments', href: `${origin}/studies/${studyId}/comments` }
			};
		}
	}
}
