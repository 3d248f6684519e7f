import type { Series, Shares } from './series.ts';
import type { SignRun } from './sign-runs.ts';
import type { Compared } from './comparison.ts';
import type { Band } from './bands.ts';

/** What every strip of the stack is given: one model choice, already turned into columns. */
export interface DrawnChoice {
	letter: string;
	name: string;
	/** 1 to 5: colour token and dash. */
	ink: number;
	series: Series;
	/** The curve of the question before, while the new one is being computed. */
	previous: Series | null;
	runs: SignRun[];
	shares: Shares;
	/** Difference from the choice that is compared with; null while the comparison is with ideal conductors. */
	difference: Compared | null;
	/** Ratio to ideal conductors, below zero where both attract so that it is drawn solid there. */
	ratio: Series;
	/** One standard uncertainty of the data to either side, where something is stated about them. */
	band: Band | null;
}

/** Room beside the axis for numerals and for the labels at line ends. */
export function stripMargins(width: number): { left: number; right: number } {
	return width < 560 ? { left: 38, right: 26 } : { left: 74, right: 72 };
}

const DASHES = ['', '11 4 3 4', '3 3', '8 4', '16 4'];

/** Blue first: ink is the colour of rules and axes, so it is the last to be handed out. */
const INKS = [2, 3, 4, 5, 1];

export const inkOf = (index: number): number => INKS[index % INKS.length];
export const inkColour = (ink: number): string => `var(--series-${ink})`;
export const dashOf = (ink: number): string => DASHES[INKS.indexOf(ink)] ?? '';
