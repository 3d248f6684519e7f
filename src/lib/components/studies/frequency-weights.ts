import type { ForcePoint } from '../../engine/contract.ts';

/** Which photon energies a pressure rests on, one line a place of the arrangement. */

export interface WeightLine {
	place: string;
	energiesEv: number[];
	/** Change of the pressure, relative, where eps'' of the place changes by its own size over one e-fold of energy. */
	weights: number[];
	/** Shares of what lies outside the measured points, where the place has a table. */
	below: number | undefined;
	above: number | undefined;
}

export function weightLines(point: ForcePoint | undefined): WeightLine[] {
	return (point?.sensitivity?.places ?? []).flatMap(({ place, kernel, reliance }) => {
		const weights = kernel.pressureWeight.map((weight) => weight ?? 0);
		if (weights.every((weight) => weight === 0)) return [];
		return [
			{
				place,
				energiesEv: kernel.energiesEv,
				weights,
				below: reliance?.below.pressure?.value,
				above: reliance?.above.pressure?.value
			}
		];
	});
}

/** Name of a place in a study, `left.layers[0].of` as `left1`. */
export function slotOfPath(path: string): string {
	if (path === 'medium') return path;
	const [side] = path.split('.');
	const layer = /layers\[(\d+)\]/.exec(path)?.[1];
	return layer === undefined ? side : `${side}${Number(layer) + 1}`;
}
