import type { ForcePoint } from '../../engine/contract.ts';

/** Whether a second computation of the same question gave the same numbers. */

export interface Recomputed {
	identical: boolean;
	/** Largest relative difference of the three quantities over all separations. */
	largest: number;
	compared: number;
}

const FIELDS = ['freeEnergyJPerM2', 'pressurePa', 'pressureGradientPaPerM'] as const;

export function compareAnswers(
	before: readonly (ForcePoint | undefined)[],
	after: readonly (ForcePoint | undefined)[]
): Recomputed {
	let largest = 0;
	let compared = 0;
	let identical = before.length === after.length;
	before.forEach((old, index) => {
		const now = after[index];
		if (!old || !now || old.separationNm !== now.separationNm) {
			identical = false;
			return;
		}
		for (const field of FIELDS) {
			compared++;
			if (Object.is(old[field], now[field])) continue;
			identical = false;
			largest = Math.max(
				largest,
				Math.abs(now[field] - old[field]) / Math.max(Math.abs(old[field]), Number.MIN_VALUE)
			);
		}
	});
	return { identical, largest, compared };
}

export function recomputedWords(results: readonly Recomputed[]): string {
	if (results.length === 0 || results.some(({ compared }) => compared === 0))
		return 'Nothing to compare with yet.';
	if (results.every(({ identical }) => identical)) {
		const numbers = results.reduce((sum, { compared }) => sum + compared, 0);
		return `Identical: all ${numbers} numbers came out the same to the last bit.`;
	}
	const largest = Math.max(...results.map((result) => result.largest));
	return `Different by at most ${largest.toExponential(1)} of the value; the engine or its runtime has changed since.`;
}
