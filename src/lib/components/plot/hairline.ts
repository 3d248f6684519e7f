/** The hairline as a slider on a logarithmic axis. */

/** One press of an arrow key. */
const STEP = Math.log(1.01);
/** With Shift: a third of a decade. */
const LEAP = Math.LN10 / 3;

export interface SliderKey {
	key: string;
	shiftKey: boolean;
}

/** Where a key takes the hairline; undefined where the key means nothing to it. */
export function movedBy(
	{ key, shiftKey }: SliderKey,
	at: number,
	min: number,
	max: number
): number | undefined {
	const held = (value: number) => Math.min(max, Math.max(min, value));
	const step = shiftKey ? LEAP : STEP;
	switch (key) {
		case 'ArrowRight':
		case 'ArrowUp':
			return held(at * Math.exp(step));
		case 'ArrowLeft':
		case 'ArrowDown':
			return held(at * Math.exp(-step));
		case 'PageUp':
			return held(at * Math.exp(LEAP));
		case 'PageDown':
			return held(at * Math.exp(-LEAP));
		case 'Home':
			return min;
		case 'End':
			return max;
		default:
			return undefined;
	}
}

/** A separation as a drag leaves it: four figures are finer than a pixel and keep the address short. */
export const settled = (separationNm: number): number => Number(separationNm.toPrecision(4));
