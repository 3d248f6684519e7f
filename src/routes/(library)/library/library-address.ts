import { SEPARATION_NM } from '$lib/components/library/hairline.ts';
import type { LibraryQuery, LibrarySort } from '$lib/schemas/material.ts';

/**
 * What the library page shows, as its address holds it. Reading an address is decode-view.ts: it needs the schemas, which
 * a browser need not load to write one.
 */

export interface LibraryView extends LibraryQuery {
	/** Where the hairline stands, in nm. */
	at: number;
}

export const VIEW_FIELDS = [
	'search',
	'class',
	'quality',
	'coversEv',
	'sort',
	'direction',
	'withoutData',
	'cursor',
	'limit'
] as const;

/** What an empty address means; a test holds it against the schema. */
export const USUAL_VIEW: LibraryView = {
	search: '',
	sort: 'material',
	direction: 'ascending',
	withoutData: false,
	limit: 100,
	at: SEPARATION_NM.first
};

/** The query of a changed view: only what differs from the defaults, and the first page unless `changes` names another. */
export function viewQuery(view: LibraryView, changes: Partial<LibraryView> = {}): '' | `?${string}` {
	const next: LibraryView = { ...view, cursor: undefined, ...changes };
	const parameters = new URLSearchParams();
	for (const field of [...VIEW_FIELDS, 'at'] as const) {
		const value = next[field];
		if (value === undefined || value === USUAL_VIEW[field]) continue;
		const text =
			typeof value === 'number' ? String(Number(value.toPrecision(4))) : value === true ? '1' : value;
		parameters.set(field, String(text));
	}
	const query = parameters.toString();
	return query === '' ? '' : `?${query}`;
}

/** A second press on a column turns its order round. */
export function sortedBy(view: LibraryView, sort: LibrarySort): '' | `?${string}` {
	const turned = view.sort === sort && view.direction === 'ascending';
	return viewQuery(view, { sort, direction: turned ? 'descending' : 'ascending' });
}
