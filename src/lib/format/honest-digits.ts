import { numberText } from './number.ts';
import { unitFor, type UnitScale } from './quantity.ts';

/** Digits that say how far they can be trusted: those the data support, then those only the arithmetic supports. */

export interface HonestNumber {
	/** Digits that the spread between data choices leaves standing, with the sign. */
	supported: string;
	/** Further digits that the numerical bound certifies and the data do not support; set lighter. */
	certified: string;
	exponent: number | null;
	unit: string;
}

const SHOWN_MAX = 4;

/** Figures that an error leaves: the first uncertain one is kept, as is usual. */
export function figuresLeft(relativeError: number): number {
	if (!(relativeError > 0)) return Infinity;
	return Math.max(1, Math.ceil(-Math.log10(relativeError) - 1e-9) + 1);
}

/**
 * @param bound  numerical error relative to the value; no figure beyond it is ever shown
 * @param spread  difference between data choices relative to the value, or null where there is only one choice
 */
export function honestNumber(
	value: number,
	scale: UnitScale,
	bound: number,
	spread: number | null
): HonestNumber {
	// A bound of b leaves floor(-log10 b) figures that cannot be wrong by one.
	const provable = bound > 0 ? Math.max(1, Math.floor(-Math.log10(bound))) : Infinity;
	const shown = Math.min(SHOWN_MAX, provable);
	const unit = unitFor(value, scale, shown);
	const { mantissa, exponent } = numberText(value / unit.size, shown);
	const supportedFigures = spread === null ? shown : Math.min(shown, figuresLeft(spread));

	let figures = 0;
	let cut = 0;
	while (cut < mantissa.length && figures < supportedFigures) {
		// Zeros before the first figure only place the point.
		if (/\d/.test(mantissa[cut]) && (figures > 0 || mantissa[cut] !== '0')) figures++;
		cut++;
	}
	return { supported: mantissa.slice(0, cut), certified: mantissa.slice(cut), exponent, unit: unit.symbol };
}
