import { describe, expect, it } from 'vitest';
import { energyOfSeparation } from '../spectra/frequency.ts';
import { heldSeparationNm, SEPARATION_NM, separationAfterKey, separationAtEnergy } from './hairline.ts';

describe("the library's hairline", () => {
	it('stands at 0.987 eV for 100 nm', () => {
		expect(energyOfSeparation(100)).toBeCloseTo(0.98663, 5);
	});

	it('moves one per cent in energy by an arrow, a third of a decade with shift', () => {
		expect(100 / (separationAfterKey(100, 'ArrowRight', false) ?? 0)).toBeCloseTo(1.01, 10);
		expect((separationAfterKey(100, 'ArrowLeft', false) ?? 0) / 100).toBeCloseTo(1.01, 10);
		expect(100 / (separationAfterKey(100, 'ArrowUp', true) ?? 0)).toBeCloseTo(10 ** (1 / 3), 10);
	});

	it('returns after a step to and fro', () => {
		const there = separationAfterKey(38, 'PageUp', false) ?? 0;
		expect(separationAfterKey(there, 'PageDown', false)).toBeCloseTo(38, 10);
	});

	it('goes to the ends and stays inside them', () => {
		expect(separationAfterKey(100, 'Home', false)).toBe(SEPARATION_NM.max);
		expect(separationAfterKey(100, 'End', false)).toBe(SEPARATION_NM.min);
		expect(separationAfterKey(SEPARATION_NM.min, 'ArrowRight', true)).toBeCloseTo(SEPARATION_NM.min, 10);
		expect(separationAtEnergy(1e6)).toBeCloseTo(SEPARATION_NM.min, 10);
		expect(heldSeparationNm(0.2)).toBe(SEPARATION_NM.min);
	});

	it('leaves other keys alone', () => {
		expect(separationAfterKey(100, 'Tab', false)).toBeNull();
	});
});
