import { describe, expect, it } from 'vitest';
import {
	energyOfSeparation,
	matsubaraXi,
	separationOfEnergy,
	separationOfXi,
	wavelengthUmOfEnergy,
	xiOfSeparation
} from './frequency.ts';

describe('frequencies and what they stand for', () => {
	// Figures of the exact SI constants, worked out by hand to the digits given.
	it('gives c/2d = 1.49896229e15 rad/s and 0.98663490 eV at 100 nm', () => {
		expect(xiOfSeparation(100)).toBeCloseTo(1.49896229e15, -6);
		expect(energyOfSeparation(100)).toBeCloseTo(0.986635, 6);
	});

	it('gives the first Matsubara frequency of 300 K as 2.46779e14 rad/s', () => {
		expect(matsubaraXi(1, 300) / 2.467790253640998e14).toBeCloseTo(1, 12);
		expect(matsubaraXi(3, 300) / matsubaraXi(1, 300)).toBeCloseTo(3, 12);
	});

	it('gives 1.239841984 µm for 1 eV', () => {
		expect(wavelengthUmOfEnergy(1)).toBeCloseTo(1.239841984, 9);
	});

	it('finds the separation back', () => {
		for (const separationNm of [1, 38, 100, 12_345]) {
			expect(separationOfXi(xiOfSeparation(separationNm)) / separationNm).toBeCloseTo(1, 12);
			expect(separationOfEnergy(energyOfSeparation(separationNm)) / separationNm).toBeCloseTo(1, 12);
		}
	});
});
