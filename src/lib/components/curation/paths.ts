import { resolve } from '$app/paths';

/** Addresses of what is done with a version, from its name slug@number. */

function partsOf(ref: string): { slug: string; number: string } {
	const [slug, number] = ref.split('@');
	return { slug, number };
}

export function draftPath(ref: string) {
	const { slug, number } = partsOf(ref);
	return resolve(`/drafts/${slug}/${number}`);
}

export function reviewPath(ref: string) {
	const { slug, number } = partsOf(ref);
	return resolve(`/reviews/${slug}/${number}`);
}
