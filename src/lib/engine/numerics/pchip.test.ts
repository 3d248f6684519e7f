import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { pchip } from './pchip.ts';

describe('pchip', () => {
	it('goes through its points and keeps a straight line straight', () => {
		const line = pchip([0, 1, 3, 7], [1, 3, 7, 15]);
		for (const x of [0, 0.3, 1, 2.2, 5, 7]) expect(line(x)).toBeCloseTo(1 + 2 * x, 13);
	});

	it('holds the end values outside', () => {
		const curve = pchip([0, 1], [2, 5]);
		expect([curve(-1), curve(2)]).toEqual([2, 5]);
	});

	it('never leaves monotone data', () => {
		const rises = fc.array(fc.double({ min: 0, max: 10, noNaN: true }), { minLength: 2, maxLength: 12 });
		fc.assert(
			fc.property(rises, (steps) => {
				const y = steps.reduce<number[]>((sums, step) => [...sums, sums[sums.length - 1] + step], [0]);
				const curve = pchip(
					y.map((_, i) => i),
					y
				);
				let before = 0;
				for (let x = 0; x <= y.length - 1; x += 0.05) {
					const value = curve(x);
					expect(value).toBeGreaterThanOrEqual(before - 1e-12);
					before = value;
				}
			})
		);
	});
});
