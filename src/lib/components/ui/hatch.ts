/** The hatch of each class of material: the code that needs no colour. Vacuum and gases stay blank. */

export type MaterialClass = 'metal' | 'semiconductor' | 'insulator' | 'polymer' | 'liquid' | 'gas';

export interface HatchTile {
	/** What a screen reader says. */
	label: string;
	/** Size of the repeated tile. */
	width: number;
	height: number;
	/** Lines of one tile. */
	path: string;
	/** Centres of its dots. */
	dots: readonly (readonly [number, number])[];
}

export const HATCHES: Record<MaterialClass, HatchTile> = {
	metal: { label: 'metal', width: 7, height: 7, path: 'M-1 8L8-1M-1 1L1-1M6 8L8 6', dots: [] },
	semiconductor: { label: 'semiconductor', width: 8, height: 8, path: 'M0 0L8 8M8 0L0 8', dots: [] },
	insulator: {
		label: 'insulator',
		width: 8,
		height: 8,
		path: '',
		dots: [
			[2, 2],
			[6, 6]
		]
	},
	polymer: { label: 'polymer', width: 14, height: 8, path: 'M0 8L14 0M-7 4L7-4M7 12L21 4', dots: [] },
	liquid: { label: 'liquid', width: 26, height: 9, path: 'M2 2.5H14M17 7H25', dots: [] },
	gas: { label: 'vacuum or gas', width: 8, height: 8, path: '', dots: [] }
};
