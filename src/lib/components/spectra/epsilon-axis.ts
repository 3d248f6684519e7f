import { logScale, type LogScale } from '../../study-sheet/log-scale.ts';

/** The vertical axis of eps(i xi): logarithmic from 1 upwards, in pixels of a strip. */

export interface EpsilonTick {
	epsilon: number;
	y: number;
	/** A power of ten is written as one above 100. */
	power: number | null;
	label: string;
	labelled: boolean;
}

export interface EpsilonAxis {
	at(epsilon: number): number;
	ticks: EpsilonTick[];
}

/** Below this span the steps between the decades are named too: a liquid has no decade of its own. */
const FEW_DECADES = 1.6;
const ROUND_STEPS = [1, 2, 3, 5];

export function epsilonAxis(
	epsilons: readonly (readonly number[])[],
	top: number,
	bottom: number
): EpsilonAxis {
	const largest = epsilons.flat().reduce((a, b) => (Number.isFinite(b) ? Math.max(a, b) : a), 2);
	const scale: LogScale = logScale([1, largest * 1.15], [bottom, top]);
	const fewDecades = Math.log10(scale.max) < FEW_DECADES;
	const everyOther = Math.log10(scale.max) > 6 ? 2 : 1;

	const ticks = [...scale.decades, ...(fewDecades ? scale.minors : [])].map((epsilon): EpsilonTick => {
		const power = Math.round(Math.log10(epsilon));
		const isDecade = scale.decades.includes(epsilon);
		const leading = Number(epsilon.toExponential()[0]);
		return {
			epsilon,
			y: scale.at(epsilon),
			power: isDecade && power > 2 ? power : null,
			label: String(epsilon),
			labelled: isDecade ? power % everyOther === 0 : fewDecades && ROUND_STEPS.includes(leading)
		};
	});
	return { at: (epsilon) => scale.at(Math.max(1, epsilon)), ticks };
}

export interface PercentAxis {
	limit: number;
	ticks: number[];
}

const STEPS = [1, 2, 5, 10];

/** Symmetric limits of round figures for a difference in per cent. */
export function percentAxis(values: readonly number[]): PercentAxis {
	const largest = values.reduce((a, b) => Math.max(a, Math.abs(b)), 0);
	if (largest === 0) return { limit: 1, ticks: [-1, 0, 1] };
	const decade = 10 ** Math.floor(Math.log10(largest));
	const step = STEPS.find((candidate) => candidate * decade >= largest * (1 - 1e-9)) ?? 10;
	const limit = step * decade;
	return { limit, ticks: [-limit, -limit / 2, 0, limit / 2, limit] };
}
