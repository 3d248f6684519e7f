import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../../engine/contract.ts';
import { modelDifference, slipBetween } from './model-difference.ts';

/**
 * Slips that were found when public listings of the fits of Rakic et al. 1998 were compared number by number: a decimal point, digits
 * exchanged, one digit, and a number that is another one. The right value stands first.
 */
const LISTED: [what: string, right: number, wrong: number, slip: ReturnType<typeof slipBetween>][] = [
	['last resonance of titanium', 19.43, 1.943, 'decimal point'],
	['resonance of copper', 2.957, 2.597, 'digits exchanged'],
	['resonance of aluminium', 0.523, 0.532, 'digits exchanged'],
	['resonance of palladium', 5.715, 1.715, 'one digit'],
	['second width of tungsten', 0.277, 0.227, 'one digit'],
	['last resonance of nickel', 8.825, 6.637, null],
	['last width of aluminium', 2.145, 0.172, null]
];

describe('slipBetween', () => {
	it.each(LISTED)('knows the slip in the %s', (_what, right, wrong, slip) => {
		expect(slipBetween(right, wrong)).toBe(slip);
		expect(slipBetween(wrong, right)).toBe(slip);
	});

	it('knows a turned sign, and takes nothing for a slip that is none', () => {
		expect(slipBetween(1.5, -1.5)).toBe('sign');
		expect(slipBetween(1.5, 2.5000001)).toBeNull();
		expect(slipBetween(0, 2)).toBeNull();
	});
});

const metal = (energyEv: number): PermittivityModel => ({
	kind: 'sum',
	of: [
		{ kind: 'drude', plasmaEnergyEv: 7.29, dampingEv: 0.082 },
		{
			kind: 'lorentz',
			terms: [
				{ strengthEv2: 1, energyEv: 0.777, dampingEv: 2.276 },
				{ strengthEv2: 2, energyEv, dampingEv: 1.762 }
			]
		}
	]
});

describe('modelDifference', () => {
	it('names the one figure that differs', () => {
		const { figures, rowCounts } = modelDifference(metal(19.43), metal(1.943));
		expect(figures).toEqual([
			{
				path: 'of[2].terms[2].energyEv',
				from: 19.43,
				to: 1.943,
				percent: expect.closeTo(-90, 9),
				slip: 'decimal point'
			}
		]);
		expect(rowCounts).toBeNull();
	});

	it('finds nothing between equals', () => {
		expect(modelDifference(metal(19.43), metal(19.43))).toEqual({ figures: [], rows: [], rowCounts: null });
	});

	const table = (epsilon2: number[], energiesEv = [1, 2, 3]): PermittivityModel => ({
		kind: 'table',
		energiesEv,
		epsilon2,
		lowEnd: { kind: 'none' },
		highEnd: { kind: 'power', exponent: 3 }
	});

	it('counts rows that changed, came and went, the largest change first', () => {
		const { rows, rowCounts, figures } = modelDifference(table([1, 2, 3]), table([1.1, 4, 9], [1, 2, 4]));
		expect(figures).toEqual([]);
		expect(rowCounts).toEqual({ first: 3, second: 3, changed: 2, added: 1, removed: 1 });
		expect(rows.slice(-2).map(({ at, percent }) => [at, percent])).toEqual([
			[2, 100],
			[1, expect.closeTo(10, 9)]
		]);
	});
});
