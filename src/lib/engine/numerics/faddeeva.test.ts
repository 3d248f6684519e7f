import { describe, expect, it } from 'vitest';
import { faddeeva } from './faddeeva.ts';

describe('the Faddeeva function', () => {
	// e^(-z^2) erfc(-i z) with 40 digits; the first is the customary check value.
	it.each([
		[1.0, 1.0, 0.3047442052569126, 0.20821893820283163],
		[3.0, 0.0, 0.00012340980408667956, 0.2011573170376004],
		[5.0, 1e-9, 3.796839507881733e-11, 0.11524596183093659],
		[0.1, 0.01, 0.9790865265534254, 0.11013063795281995],
		[0.25, 3.0, 0.17801313515948988, 0.013523389144577078],
		[12.3, 0.004, 1.5067167702088901e-5, 0.04602218852308557],
		[2.5, 6.2, 0.07787688665840212, 0.030728484749599286],
		[0.0, 0.5, 0.6156903441929259, 0.0],
		[40.0, 100.0, 0.004863609319322315, 0.0019452760452256434],
		[3.5, 0.8, 0.03963723390077644, 0.15822686470778868]
	])('w(%f + %f i)', (x, y, re, im) => {
		const w = faddeeva(x, y);
		expect(Math.abs(w.re / re - 1)).toBeLessThan(2e-15);
		if (im !== 0) expect(Math.abs(w.im / im - 1)).toBeLessThan(1e-13);
		else expect(Math.abs(w.im)).toBeLessThan(1e-15);
	});

	it('joins where the pole leaves the strip and where the nodes change', () => {
		for (const [x, y, dx, dy] of [
			[1.3, 2 * Math.PI, 0, 1e-9],
			[0.125, 0.3, 1e-9, 0],
			[0.375, 0.002, 1e-9, 0]
		]) {
			const [before, after] = [faddeeva(x - dx, y - dy), faddeeva(x + dx, y + dy)];
			expect(Math.abs(after.re / before.re - 1)).toBeLessThan(1e-7);
			expect(Math.abs(after.im / before.im - 1)).toBeLessThan(1e-7);
		}
	});

	it('is refused below the real axis', () => {
		expect(() => faddeeva(1, -1e-3)).toThrow(RangeError);
	});
});
