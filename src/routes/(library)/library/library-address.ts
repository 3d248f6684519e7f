import { heldSeparationNm, SEPARATION_NM } from '$lib/components/library/hairline.ts';
import { libraryQuery, type LibraryQuery, type LibrarySort } from '$lib/schemas/material.ts';

/** What the library page shows, as its address holds it; decoding is total: what cannot be read is told and left out. */

export interface LibraryView extends LibraryQuery {
	/** Where the hairline stands, in nm. */
	at: number;
}

export interface AddressProblem {
	field: string;
	text: string;
	message: string;
}

const FIELDS = [
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

const WHAT_IS_RIGHT: Partial<Record<(typeof FIELDS)[number] | 'at', string>> = {
	search: 'at most 200 characters',
	class: 'metal, semiconductor, insulator, polymer, liquid or gas',
	quality: 'checked or provisional',
	coversEv: 'an energy in eV above zero, as 0.5',
	sort: 'material, class, dataset, static, source, quality or published',
	direction: 'ascending or descending',
	limit: 'a whole number from 1 to 200',
	at: 'a separation in nm above zero'
};

const DEFAULTS: LibraryView = { ...libraryQuery.parse({}), at: SEPARATION_NM.first };

function separation(text: string | null): number | null {
	if (text === null || text.trim() === '') return DEFAULTS.at;
	const value = Number(text);
	return Number.isFinite(value) && value > 0 ? heldSeparationNm(value) : null;
}

/** A decimal comma is what half of the world types into the energy field. */
function given(field: string, text: string): string {
	return field === 'coversEv' ? text.trim().replace(',', '.') : text;
}

export function decodeView(parameters: URLSearchParams): { view: LibraryView; problems: AddressProblem[] } {
	const problems: AddressProblem[] = [];
	const readable: Record<string, string> = {};
	const tell = (field: keyof typeof WHAT_IS_RIGHT, text: string) =>
		problems.push({ field, text, message: `${field} reads ${WHAT_IS_RIGHT[field] ?? 'otherwise'}` });

	for (const field of FIELDS) {
		const text = parameters.get(field);
		if (text === null) continue;
		const candidate = given(field, text);
		if (libraryQuery.safeParse({ [field]: candidate }).success) readable[field] = candidate;
		else tell(field, text);
	}

	const at = separation(parameters.get('at'));
	if (at === null) tell('at', parameters.get('at') ?? '');
	return { view: { ...libraryQuery.parse(readable), at: at ?? DEFAULTS.at }, problems };
}

/** The query of a changed view: only what differs from the defaults, and the first page unless `changes` names another. */
export function viewQuery(view: LibraryView, changes: Partial<LibraryView> = {}): '' | `?${string}` {
	const next: LibraryView = { ...view, cursor: undefined, ...changes };
	const parameters = new URLSearchParams();
	for (const field of [...FIELDS, 'at'] as const) {
		const value = next[field];
		if (value === undefined || value === DEFAULTS[field]) continue;
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
