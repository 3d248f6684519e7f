import { permittivityOnImaginaryAxis } from '../../engine/index.ts';
import type { PermittivityModel } from '../../engine/contract.ts';
import { cellAt, cellsIn } from '../../screening/cells.ts';
import type { ScreeningPlan } from '../../schemas/screening.ts';
import { NotFound } from '../errors.ts';
import * as versions from '../library/versions.ts';

/** Why an arrangement attracts or repels: the order of the permittivities where they count (methods.md, sign rule). */

export interface PermittivityOrder {
	/** rad/s, ascending. */
	xiRadPerS: number[];
	curves: { place: 'left' | 'medium' | 'right'; name: string; epsilon: number[] }[];
	/** c/2d at the asked separation: below it all frequencies count, far above none. */
	tellingRadPerS: number;
	/** First Matsubara frequency; null at T = 0. */
	firstRadPerS: number | null;
	/** Up to c/2d, the share of the axis (in ln xi) on which the medium lies between the two bodies. */
	between: number;
}

const FROM = 1e13;
const DECADES = 4;
const PER_DECADE = 16;
const SPEED_OF_LIGHT = 299792458;
/** 2 pi k / hbar of the SI. */
const MATSUBARA_PER_K = (4 * Math.PI ** 2 * 1.380649e-23) / 6.62607015e-34;

/** Of the surfaces that face the gap: a film goes before the body under it. */
export async function permittivityOrder(
	plan: ScreeningPlan,
	index: number,
	at: number
): Promise<PermittivityOrder> {
	if (!Number.isInteger(index) || index < 0 || index >= cellsIn(plan))
		throw new NotFound('There is no such arrangement.');
	const cell = cellAt(plan, index);
	const left = plan.left[cell.left];
	const right = plan.right[cell.right];
	const places = [
		['left', left.coating?.of ?? left.of],
		['medium', plan.media[cell.medium].of],
		['right', right.coating?.of ?? right.of]
	] as const;
	const found = await versions.resolve(places.map(([, of]) => plan.materials[of].ref));
	const xiRadPerS = Array.from(
		{ length: DECADES * PER_DECADE + 1 },
		(_, step) => FROM * 10 ** (step / PER_DECADE)
	);
	const curves = places.map(([place, of]) => {
		const { ref, name } = plan.materials[of];
		const epsilon = permittivityOnImaginaryAxis(found.get(ref)?.model as PermittivityModel);
		// An ideal conductor has no number; the drawing ends at its upper edge anyway.
		return { place, name, epsilon: xiRadPerS.map((xi) => Math.min(1e6, epsilon(xi))) };
	});
	const separation = plan.separationsNm[at] ?? plan.separationsNm[0];
	const tellingRadPerS = SPEED_OF_LIGHT / (2 * separation * 1e-9);
	const temperature = plan.temperaturesK[cell.temperature];
	const counted = xiRadPerS.flatMap((xi, step) => (xi <= tellingRadPerS ? [step] : []));
	const [l, m, r] = curves.map(({ epsilon }) => epsilon);
	const between = counted.filter((step) => (l[step] - m[step]) * (m[step] - r[step]) > 0).length;
	return {
		...{ xiRadPerS, curves, tellingRadPerS },
		firstRadPerS: temperature === 0 ? null : MATSUBARA_PER_K * temperature,
		between: counted.length === 0 ? 0 : between / counted.length
	};
}
