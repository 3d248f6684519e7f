import type { Criterion } from '../schemas/screening.ts';

/** What a criterion makes of one arrangement's pressures: a figure to rank by, and whether it is what was looked for. */

export interface Judged {
	qualifies: boolean;
	/** In the unit of `figureWords`; null where it cannot be said. */
	figure: number | null;
}

/** What the figure is, and whether more of it is better. */
export const FIGURES: Record<Criterion['kind'], { words: string; unit: string; best: 'most' | 'least' }> = {
	repulsive: { words: 'least pressure in the window', unit: 'Pa', best: 'most' },
	below: { words: 'largest magnitude in the window', unit: 'Pa', best: 'least' },
	stableEquilibrium: { words: 'separation of the equilibrium', unit: 'nm', best: 'least' },
	stiffestTrap: { words: 'stiffness at the equilibrium', unit: 'Pa/m', best: 'most' },
	leastAdhesion: { words: 'largest pull in the window', unit: 'Pa', best: 'least' },
	leastSpread: { words: 'largest spread between data and rules', unit: '1', best: 'least' },
	mostPerCoating: { words: 'relative change per nanometre of coating', unit: '1/nm', best: 'most' }
};

/** Separations of a window; all where none is stated. */
export function windowOf({ fromNm, toNm }: Criterion, separationsNm: readonly number[]): number[] {
	return separationsNm.flatMap((separation, index) =>
		separation >= (fromNm ?? 0) * (1 - 1e-12) && separation <= (toNm ?? Infinity) * (1 + 1e-12) ? [index] : []
	);
}

/** From repulsion to attraction with growing distance, between two separations of the list. */
export interface Trap {
	separationNm: number;
	/** -dP/dd, Pa/m: how strongly it is held. */
	stiffnessPaPerM: number;
}

/** The first stable equilibrium, with P taken straight over ln d between the two separations around it. */
export function trapIn(
	separationsNm: readonly number[],
	pressures: readonly number[],
	within: readonly number[]
): Trap | null {
	for (let place = 0; place + 1 < within.length; place += 1) {
		const [a, b] = [within[place], within[place + 1]];
		const [before, after] = [pressures[a], pressures[b]];
		if (!(before > 0 && after < 0)) continue;
		const slope = (after - before) / Math.log(separationsNm[b] / separationsNm[a]);
		const separationNm = separationsNm[a] * Math.exp(-before / slope);
		return { separationNm, stiffnessPaPerM: -slope / (separationNm * 1e-9) };
	}
	return null;
}

/**
 * By the pressures of one arrangement alone; spread and coating need others, and are judged where all stand together.
 *
 * @param within  places of the separations that count
 */
export function judge(
	criterion: Criterion,
	separationsNm: readonly number[],
	pressures: readonly number[],
	within: readonly number[]
): Judged {
	const values = within.map((index) => pressures[index]);
	if (values.length === 0 || values.some((value) => Number.isNaN(value)))
		return { qualifies: false, figure: null };
	switch (criterion.kind) {
		case 'repulsive': {
			const figure = Math.min(...values);
			return { qualifies: figure > 0, figure };
		}
		case 'below': {
			const figure = Math.max(...values.map(Math.abs));
			return { qualifies: figure <= criterion.pressurePa, figure };
		}
		case 'leastAdhesion':
			return { qualifies: true, figure: Math.max(0, -Math.min(...values)) };
		case 'stableEquilibrium':
		case 'stiffestTrap': {
			const trap = trapIn(separationsNm, pressures, within);
			if (!trap) return { qualifies: false, figure: null };
			return {
				qualifies: true,
				figure: criterion.kind === 'stiffestTrap' ? trap.stiffnessPaPerM : trap.separationNm
			};
		}
		case 'leastSpread':
		case 'mostPerCoating':
			return { qualifies: false, figure: null };
	}
}

/** Over data combinations: (most - least)/|reference|, the largest over the window. */
export function spreadFigure(
	reference: readonly number[],
	least: readonly number[],
	most: readonly number[],
	within: readonly number[]
): Judged {
	const shares = within.map((index) => (most[index] - least[index]) / Math.abs(reference[index]));
	const figure = Math.max(...shares);
	return Number.isFinite(figure) ? { qualifies: true, figure } : { qualifies: false, figure: null };
}

/** Between two thicknesses of the same coating: relative change per nanometre, the largest over the window. */
export function coatingFigure(
	thin: { pressures: readonly number[]; thicknessNm: number },
	thick: { pressures: readonly number[]; thicknessNm: number },
	within: readonly number[]
): number | null {
	const across = thick.thicknessNm - thin.thicknessNm;
	const shares = within.map((index) => {
		const [a, b] = [thin.pressures[index], thick.pressures[index]];
		return Math.abs(b - a) / Math.max(Math.abs(a), Math.abs(b)) / across;
	});
	const figure = Math.max(...shares);
	return Number.isFinite(figure) ? figure : null;
}
