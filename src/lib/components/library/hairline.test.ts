import { describe, expect, it } from 'vitest';
import { energyOfSeparation } from '../spectra/frequency.ts';
import { heldSeparationNm, SEPARATION_NM, separationAfterKey, separationAtEnergy } from './hairline.ts';

describe("the library's hairline", () => {
	it('stands at 0.987 eV for 100 nm', () => {
		expect(energyOfSeparation(100)).toBeCloseTo(0.98663, 5);
	});

	const after = (separationNm: number, key: string, shiftKey = false) =>
		separationAfterKey(separationNm, { key, shiftKey }) ?? Number.NaN;

	it('moves one per cent in energy by an arrow, a third of a decade with shift', () => {
		expect(100 / after(100, 'ArrowRight')).toBeCloseTo(1.01, 10);
		expect(after(100, 'ArrowLeft') / 100).toBeCloseTo(1.01, 10);
		expect(100 / after(100, 'ArrowUp', true)).toBeCloseTo(10 ** (1 / 3), 10);
	});

	it('returns after a step to and fro', () => {
		expect(after(after(38, 'PageUp'), 'PageDown')).toBeCloseTo(38, 10);
	});

	it('goes to the ends and stays inside them', () => {
		expect(after(100, 'Home') / SEPARATION_NM.max).toBeCloseTo(1, 10);
		expect(after(100, 'End')).toBeCloseTo(SEPARATION_NM.min, 10);
		expect(after(SEPARATION_NM.min, 'ArrowRight', true)).toBeCloseTo(SEPARATION_NM.min, 10);
		expect(separationAtEnergy(1e6)).toBeCloseTo(SEPARATION_NM.min, 10);
		expect(heldSeparationNm(0.2)).toBe(SEPARATION_NM.min);
	});

	it('leaves other keys alone', () => {
		expect(separationAfterKey(100, { key: 'Tab', shiftKey: false })).toBeUndefined();
	});
});
