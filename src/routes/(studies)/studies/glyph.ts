import { decodeStudy } from '$lib/schemas/study-address.ts';

/** A study's thumbnail: two bars and the line between them, apart by its own separation on the common axis. */
export interface Glyph {
	/** Of the gap, as a share of the axis from 0.1 nm to 100 um. */
	gap: number;
	separationNm: number;
	choices: number;
}

const DECADES = 6;

export function glyphOf(query: string): Glyph {
	const { study } = decodeStudy(new URLSearchParams(query));
	const share = (Math.log10(study.atNm) + 1) / DECADES;
	return {
		gap: Math.min(1, Math.max(0.04, share)),
		separationNm: study.atNm,
		choices: study.choices.length
	};
}
