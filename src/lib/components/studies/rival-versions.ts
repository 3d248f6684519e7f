import type { ForcePoint } from '../../engine/contract.ts';
import type { ForceRequestInput } from '../../schemas/force.ts';
import type { MaterialDetail } from '../../schemas/material-detail.ts';
import { materialIn, slotsOf } from '../../schemas/study-slots.ts';
import { choiceRequest } from '../../schemas/study-request.ts';
import type { Quantity, Study } from '../../schemas/study.ts';
import { quartiles, type Quartiles } from '../../study-sheet/disagreement.ts';

/** All published versions of a material held against each other in the places where an arrangement has it. */

export const RIVALS_AT_ONCE = 20;

/** `left1` as the engine names it, `left.layers[0]`. */
export function placeOf(slot: string): string {
	if (slot === 'medium') return slot;
	const side = slot.startsWith('left') ? 'left' : 'right';
	const layer = Number(slot.slice(side.length));
	return layer === 0 ? `${side}.substrate` : `${side}.layers[${layer - 1}]`;
}

/** Published versions of the material, newest of each dataset first, but not the one that is there already. */
export function rivalsIn({ datasets }: MaterialDetail, version: string): string[] {
	return datasets
		.flatMap(({ slug, versions }) =>
			versions.filter(({ state }) => state === 'published').map(({ number }) => `${slug}@${number}`)
		)
		.filter((ref) => ref !== version);
}

/** The first choice at these separations, with each rival in every place that has the version. */
export function rivalRequest(
	study: Study,
	version: string,
	rivals: readonly string[],
	separationsNm: readonly number[]
): ForceRequestInput {
	const choice = study.choices[0];
	const slots = slotsOf(study).filter((slot) => materialIn(study, choice, slot)?.version === version);
	const rule = materialIn(study, choice, slots[0] ?? '')?.zeroFrequency;
	return {
		...choiceRequest(study, choice, [...separationsNm], []),
		rivals: rivals.slice(0, RIVALS_AT_ONCE).map((ref) => ({
			places: slots.map(placeOf),
			of: { version: ref, ...(rule === undefined ? {} : { zeroFrequency: rule }) }
		}))
	};
}

export interface SpreadRow extends Quartiles {
	separationNm: number;
	/** By the version that the study names. */
	own: number;
	count: number;
}

/** Only energy and pressure are spread; undefined for another quantity. */
export function spreadRows(points: readonly (ForcePoint | undefined)[], quantity: Quantity): SpreadRow[] {
	const field = quantity === 'energy' ? 'freeEnergyJPerM2' : 'pressurePa';
	return points.flatMap((point) => {
		if (!point?.spread) return [];
		const values = [point[field], ...point.spread.rivals.map((rival) => rival[field])];
		const found = quartiles(values);
		return found
			? [{ ...found, separationNm: point.separationNm, own: point[field], count: values.length }]
			: [];
	});
}
