import { describe, expect, it } from 'vitest';
import { trilogarithm } from './trilogarithm.ts';

/** The defining series, summed from its small end; slow near one, where 10^6 terms leave 1e-12. */
function series(x: number, terms: number): number {
	let sum = 0;
	for (let k = terms; k >= 1; k--) sum += x ** k / k ** 3;
	return sum;
}

describe('trilogarithm', () => {
	it.each([-0.99, -0.7, -0.5, -0.3, 1e-12, 0.2, 0.4999, 0.5001, 0.7, 0.9, 0.99])(
		'agrees with its series at %d',
		(x) => {
			expect(trilogarithm(x) / series(x, 5000) - 1).toBeCloseTo(0, 13);
		}
	);

	it('is zeta(3) at one and -3/4 zeta(3) at minus one', () => {
		expect(trilogarithm(1)).toBe(1.2020569031595942);
		expect(trilogarithm(-1)).toBeCloseTo(-0.75 * 1.2020569031595942, 15);
	});

	it('keeps relative accuracy for tiny arguments', () => {
		expect(trilogarithm(-3e-300)).toBe(-3e-300);
	});

	it('refuses arguments beyond one', () => {
		expect(() => trilogarithm(1.0000001)).toThrow(RangeError);
	});
});
