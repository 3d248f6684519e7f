/** What differs between two versions, and what that does to forces, as pages and API give it. */

export interface FigureChange {
	/** Place in the model, counted from 1: `of[2].terms[5].energyEv`. */
	path: string;
	from: number | string | null;
	to: number | string | null;
	/** Second over first, less one; null where that says nothing. */
	percent: number | null;
	/** What a slip of the pen would look like; null where it looks like another number. */
	slip: 'sign' | 'decimal point' | 'digits exchanged' | 'one digit' | null;
}

export interface RowChange {
	/** Energy in eV, or frequency in rad/s of a table of eps(i xi). */
	at: number;
	from: number | null;
	to: number | null;
	percent: number | null;
}

export interface ModelDifference {
	figures: FigureChange[];
	/** The largest changes first, at most 60. */
	rows: RowChange[];
	/** Null where not both are tables of one kind. */
	rowCounts: { first: number; second: number; changed: number; added: number; removed: number } | null;
}

export interface ForceChangePoint {
	separationNm: number;
	/** Pressure with the first and with the second version; null where there is no first. */
	fromPa: number | null;
	toPa: number;
	percent: number | null;
	/** One attracts and the other repels. */
	signChanges: boolean;
	/** The change is larger than both numerical bounds together. */
	beyondBound: boolean;
}

export interface ForceChange {
	/** As "gold against silica, across water, 300 K". */
	arrangement: string;
	points: ForceChangePoint[];
	/** Largest change in per cent over the separations; null where there is no first. */
	largestPercent: number | null;
	signChanges: boolean;
}
