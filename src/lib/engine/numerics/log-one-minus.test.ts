import { describe, expect, it } from 'vitest';
import { logOneMinus } from './log-one-minus.ts';

/** Four units of the last place; the runtime's own log1p is good to one. */
const TOLERANCE = 5 * 2 ** -53;

const close = (z: number): number => {
	const exact = Math.log1p(-z);
	return exact === 0 ? Math.abs(logOneMinus(z)) : Math.abs(logOneMinus(z) / exact - 1);
};

describe('ln(1 - z)', () => {
	it('keeps its digits over the whole range', () => {
		let worst = 0;
		for (let i = 0; i <= 200_000; i++) worst = Math.max(worst, close(-1 + (i / 200_000) * 1.999999));
		expect(worst).toBeLessThan(TOLERANCE);
	});

	it('keeps its digits where z is small, of either sign', () => {
		let worst = 0;
		for (let e = -300; e < 0; e += 0.01) worst = Math.max(worst, close(10 ** e), close(-(10 ** e)));
		expect(worst).toBeLessThan(TOLERANCE);
		expect(Math.abs(logOneMinus(0))).toBe(0);
	});

	it('says what the logarithm says outside', () => {
		expect(logOneMinus(-5)).toBe(Math.log1p(5));
		expect(logOneMinus(Number.NaN)).toBeNaN();
	});
});
