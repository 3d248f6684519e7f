import { MINUS } from '../../format/number.ts';

/**
 * eps' of a metal runs from large negative values through zero: this scale is linear near zero and logarithmic in both
 * directions beyond one.
 */
export function signedLog(value: number): number {
	return Math.sign(value) * Math.log10(1 + Math.abs(value));
}

export interface SignedTick {
	at: number;
	/** With `<sup>`, as the plotting package reads it. */
	text: string;
}

const powerText = (power: number) => (power <= 2 ? String(10 ** power) : `10<sup>${power}</sup>`);

/** Zero and the powers of ten between two values; every other one where they would crowd. */
export function signedTicks(low: number, high: number): SignedTick[] {
	const reach = Math.max(Math.abs(low), Math.abs(high), 1);
	const last = Math.floor(Math.log10(reach));
	const step = last > 4 ? 2 : 1;
	const ticks: SignedTick[] = [{ at: 0, text: '0' }];
	for (let power = 0; power <= last; power += step) {
		const value = 10 ** power;
		if (value <= high) ticks.push({ at: signedLog(value), text: powerText(power) });
		if (-value >= low) ticks.unshift({ at: signedLog(-value), text: `${MINUS}${powerText(power)}` });
	}
	return ticks;
}
