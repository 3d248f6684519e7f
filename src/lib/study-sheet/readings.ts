import type { ForcePoint } from '../engine/contract.ts';
import type { Quantity } from '../schemas/study.ts';
import { interpolate, meanExponent, readingOf, sharesOf, type Series } from './series.ts';

/** What stands under a hairline, one entry a model choice. */

export interface Reading {
	letter: string;
	ink: number;
	value: number;
	/** Relative; null while the value is read off the drawn curve and not yet computed at this very separation. */
	bound: number | null;
	met: boolean;
	why: string | undefined;
	shapeError: number | undefined;
	staticShare: number | undefined;
	/** One standard uncertainty that the data leave, absolute; absent where nothing is stated about them. */
	deviation?: number | undefined;
	/** It still answers the question before; the new one is being computed. */
	stale: boolean;
}

const SAME = 1e-9;

/** The point that was computed at this separation, if it has arrived. */
export function pointAt(points: readonly (ForcePoint | undefined)[], atNm: number): ForcePoint | undefined {
	return points.find((point) => point && Math.abs(point.separationNm / atNm - 1) < SAME);
}

export function readingAt(
	choice: { letter: string; ink: number; series: Series },
	exact: readonly (ForcePoint | undefined)[],
	quantity: Quantity,
	atNm: number
): Reading | undefined {
	const point = pointAt(exact, atNm);
	const computed = point && readingOf(point, quantity);
	const { letter, ink } = choice;
	if (point && computed) {
		return {
			letter,
			ink,
			value: computed.value,
			bound: computed.bound,
			met: point.met,
			why: point.why,
			shapeError: point.shapeError,
			staticShare: sharesOf([point], quantity).static[0],
			stale: false
		};
	}
	const value = interpolate(choice.series.separationsNm, choice.series.values, atNm);
	if (value === undefined) return undefined;
	const unknown = { why: undefined, shapeError: undefined, staticShare: undefined, stale: false };
	return { letter, ink, value, bound: null, met: true, ...unknown };
}

/** Largest difference between readings relative to this one; null where there is nothing to differ from. */
export function relativeSpread(reading: Reading, all: readonly Reading[]): number | null {
	if (all.length < 2 || reading.value === 0) return null;
	const furthest = Math.max(...all.map(({ value }) => Math.abs(value - reading.value)));
	return furthest / Math.abs(reading.value);
}

/** Lowest and highest of the readings, for the spread that is kept apart from the bound. */
export function spreadOf(all: readonly Reading[]): { low: number; high: number } | null {
	if (all.length < 2) return null;
	const values = all.map(({ value }) => value);
	return { low: Math.min(...values), high: Math.max(...values) };
}

export type SignAgreement = 'one' | 'agree' | 'disagree';

export function signAgreement(all: readonly Reading[]): SignAgreement {
	if (all.length < 2) return 'one';
	return new Set(all.map(({ value }) => Math.sign(value))).size === 1 ? 'agree' : 'disagree';
}

export interface Difference {
	letter: string;
	ink: number;
	value: number;
	change: number;
	exponent: number | undefined;
}

/** From the parked hairline to the red one. */
export function differencesFrom(
	parked: readonly Reading[],
	parkedNm: number,
	now: readonly Reading[],
	atNm: number
): Difference[] {
	return now.flatMap((reading) => {
		const before = parked.find(({ letter }) => letter === reading.letter);
		if (!before) return [];
		return [
			{
				letter: reading.letter,
				ink: reading.ink,
				value: before.value,
				change: reading.value - before.value,
				exponent: meanExponent(parkedNm, before.value, atNm, reading.value)
			}
		];
	});
}
