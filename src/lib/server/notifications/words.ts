import { isReviewLetter, writeReviewLetter } from '../mail/review-letters.ts';

/** A notification in the words of the mail that says the same; its link stays inside the application. */
export function words(
	kind: string,
	data: Record<string, unknown>
): { subject: string; paragraphs: string[]; link: { text: string; href: string } } {
	if (!isReviewLetter(kind)) throw new Error(`A notification of the unknown kind ${kind}.`);
	const { subject, paragraphs, link } = writeReviewLetter(kind, data, '');
	return { subject, paragraphs, link: link ?? { text: 'Open the library', href: '/library' } };
}
