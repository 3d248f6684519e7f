import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { logScale } from './log-scale.ts';

describe('the shared logarithmic axis', () => {
	const scale = logScale([1, 1e4], [74, 874]);

	it('puts decades at equal steps', () => {
		expect(scale.decades).toEqual([1, 10, 100, 1000, 10000]);
		expect(scale.decades.map((decade) => Math.round(scale.at(decade)))).toEqual([74, 274, 474, 674, 874]);
	});

	it('has eight minor ticks in each decade', () => {
		expect(scale.minors).toHaveLength(32);
	});

	it('reads back the value that it drew', () => {
		fc.assert(
			fc.property(fc.double({ min: 1, max: 1e4, noNaN: true }), (value) => {
				expect(scale.invert(scale.at(value)) / value).toBeCloseTo(1, 10);
			})
		);
	});

	it('holds pixels outside inside the axis', () => {
		expect(scale.invert(-100)).toBe(1);
		expect(scale.invert(5000)).toBe(10000);
	});
});
