import type { Quality } from '$lib/schemas/version.ts';
import { heldSeparationNm, SEPARATION_NM } from '$lib/components/library/hairline.ts';

/** What the material page draws, as its address holds it. Anything it cannot follow it leaves out and says so. */

/** A sixth curve would need a picture of its own. */
export const DRAWN_MAX = 5;

export interface MaterialView {
	/** Slugs of datasets, in the order of the list. */
	drawn: string[];
	/** Two slugs, or none. */
	compared: { first: string; second: string } | null;
	/** Where the hairline stands, in nm. */
	at: number;
}

export interface DecodedView {
	view: MaterialView;
	problems: string[];
}

/** What is drawn unasked: checked data before provisional ones, each in the order of the list. */
export function usuallyDrawn(datasets: readonly { slug: string; quality: Quality }[]): string[] {
	const ranked = [
		...datasets.filter(({ quality }) => quality === 'checked'),
		...datasets.filter(({ quality }) => quality === 'provisional')
	].slice(0, DRAWN_MAX);
	return datasets.filter((dataset) => ranked.includes(dataset)).map(({ slug }) => slug);
}

/** `datasets` are those of the material that have a published version, in the order of the list. */
export function decodeMaterialView(
	parameters: URLSearchParams,
	datasets: readonly { slug: string; quality: Quality }[]
): DecodedView {
	const slugs = datasets.map(({ slug }) => slug);
	const problems: string[] = [];
	const known = (slug: string) => slugs.includes(slug);

	const asked = parameters.getAll('draw').filter((slug) => slug !== '');
	for (const slug of asked)
		if (!known(slug)) problems.push(`This material has no published dataset “${slug}”.`);
	const wanted = slugs.filter((slug) => asked.includes(slug));
	if (wanted.length > DRAWN_MAX)
		problems.push(`At most ${DRAWN_MAX} datasets are drawn at a time; the first ${DRAWN_MAX} are.`);
	const drawn = (wanted.length === 0 ? usuallyDrawn(datasets) : wanted).slice(0, DRAWN_MAX);

	const [first, second] = [parameters.get('first') ?? '', parameters.get('second') ?? ''];
	const compared = known(first) && known(second) && first !== second ? { first, second } : null;
	if (compared === null && (first !== '' || second !== ''))
		problems.push('A comparison takes two different datasets of this material.');

	const text = parameters.get('at') ?? '';
	const at = text === '' ? SEPARATION_NM.first : Number(text);
	if (!(Number.isFinite(at) && at > 0)) problems.push(`“${text}” is no separation in nm.`);
	return {
		view: {
			drawn,
			compared,
			at: Number.isFinite(at) && at > 0 ? heldSeparationNm(at) : SEPARATION_NM.first
		},
		problems
	};
}

export function materialQuery(view: MaterialView, usual: readonly string[]): '' | `?${string}` {
	const parameters = new URLSearchParams();
	if (view.drawn.length > 0 && view.drawn.join() !== usual.join())
		for (const slug of view.drawn) parameters.append('draw', slug);
	if (view.compared !== null) {
		parameters.set('first', view.compared.first);
		parameters.set('second', view.compared.second);
	}
	if (view.at !== SEPARATION_NM.first) parameters.set('at', String(Number(view.at.toPrecision(4))));
	const query = parameters.toString();
	return query === '' ? '' : `?${query}`;
}
