import { heldSeparationNm } from '$lib/components/library/hairline.ts';
import { libraryQuery } from '$lib/schemas/material.ts';
import { USUAL_VIEW, VIEW_FIELDS, type LibraryView } from './library-address.ts';

/** Reading the address of the library page is total: what cannot be read is told and left out. */

export interface AddressProblem {
	field: string;
	text: string;
	message: string;
}

const WHAT_IS_RIGHT: Partial<Record<(typeof VIEW_FIELDS)[number] | 'at', string>> = {
	search: 'at most 200 characters',
	class: 'metal, semiconductor, insulator, polymer, liquid or gas',
	quality: 'checked or provisional',
	coversEv: 'an energy in eV above zero, as 0.5',
	sort: 'material, class, dataset, static, source, quality or published',
	direction: 'ascending or descending',
	limit: 'a whole number from 1 to 200',
	at: 'a separation in nm above zero'
};

function separation(text: string | null): number | null {
	if (text === null || text.trim() === '') return USUAL_VIEW.at;
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

	for (const field of VIEW_FIELDS) {
		const text = parameters.get(field);
		if (text === null) continue;
		const candidate = given(field, text);
		if (libraryQuery.safeParse({ [field]: candidate }).success) readable[field] = candidate;
		else tell(field, text);
	}

	const at = separation(parameters.get('at'));
	if (at === null) tell('at', parameters.get('at') ?? '');
	return { view: { ...libraryQuery.parse(readable), at: at ?? USUAL_VIEW.at }, problems };
}
