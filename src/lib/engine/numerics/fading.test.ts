import { describe, expect, it } from 'vitest';
import { FADED, fading } from './fading.ts';

/** A few units of the last place of each. */
const TOLERANCE = 4 * 2 ** -53;
const kept = new Float64Array(1);
const lost = new Float64Array(1);

describe('e^-x and 1 - e^-x', () => {
	it.each([
		['evenly over the table', (i: number) => (i / 100_000) * FADED],
		['down to films of no thickness', (i: number) => 10 ** (-18 * (1 - i / 100_000))]
	])('keep their digits %s', (_, place) => {
		let worst = 0;
		for (let i = 0; i < 100_000; i++) {
			const x = place(i);
			fading(x, kept, lost, 0);
			worst = Math.max(worst, Math.abs(kept[0] / Math.exp(-x) - 1));
			if (x > 0) worst = Math.max(worst, Math.abs(lost[0] / -Math.expm1(-x) - 1));
		}
		expect(worst).toBeLessThan(TOLERANCE);
	});

	it('end in nothing kept and all lost', () => {
		fading(0, kept, lost, 0);
		expect([kept[0], lost[0]]).toEqual([1, 0]);
		fading(1000, kept, lost, 0);
		expect([kept[0], lost[0]]).toEqual([0, 1]);
		fading(Infinity, kept, lost, 0);
		expect([kept[0], lost[0]]).toEqual([0, 1]);
	});
});
