import { describe, expect, it } from 'vitest';
import { logLattice } from '../numerics/log-lattice.ts';
import { NO_STATIC_LIMIT } from '../permittivity/susceptibility.ts';
import {
	zeroFrequencyMaterial,
	zeroFrequencyReflection,
	type ZeroFrequencyMaterial
} from './zero-frequency.ts';

const lattice = logLattice(0.5, 1, 1e-12);
const wp2 = 4;
const vacuum = zeroFrequencyMaterial(NO_STATIC_LIMIT, 1, undefined);
const drude = { ...NO_STATIC_LIMIT, slope: 3, plasmaSquared: wp2 };
const plasma = { ...NO_STATIC_LIMIT, square: wp2, plasmaSquared: wp2 };
const insulator = { ...NO_STATIC_LIMIT, finite: 3 };

function reflection(polarisation: 'te' | 'tm', wall: ZeroFrequencyMaterial, medium = vacuum): Float64Array {
	const r = new Float64Array(lattice.count);
	zeroFrequencyReflection(polarisation, lattice, 0, 1, [medium, wall], new Float64Array(2), false, r);
	return r;
}

describe('the n = 0 term of a material', () => {
	it('is that of the model as written where nothing is stated', () => {
		expect(zeroFrequencyMaterial(plasma, 1, undefined)).toMatchObject({ order: 2, square: wp2 });
		expect(zeroFrequencyMaterial(drude, 1, undefined)).toMatchObject({ order: 1, square: 0 });
		expect(zeroFrequencyMaterial(insulator, 1, undefined)).toMatchObject({ order: 0, amplitude: 3 });
	});

	it.each([
		['drude', 1, 0],
		['ideal', 1, -1]
	] as const)('under the rule "%s" reflects TM by %d and TE by %d', (rule, tm, te) => {
		const wall = zeroFrequencyMaterial(drude, 1, rule);
		expect(reflection('tm', wall).every((r) => r === tm)).toBe(true);
		expect(reflection('te', wall).every((r) => r === te)).toBe(true);
	});

	it('under the rule "plasma" drops the damping and keeps TE', () => {
		const te = reflection('te', zeroFrequencyMaterial(drude, 1, 'plasma'));
		te.forEach((r, i) => {
			const q = lattice.s[i];
			const kappa = Math.sqrt(q * q + wp2);
			expect(r).toBeCloseTo((q - kappa) / (q + kappa), 14);
		});
	});

	it('reflects by its static permittivity and permeability', () => {
		const wall = zeroFrequencyMaterial(insulator, 3, undefined);
		reflection('tm', wall).forEach((r) => expect(r).toBeCloseTo(3 / 5, 15));
		reflection('te', wall).forEach((r) => expect(r).toBeCloseTo(1 / 2, 15));
	});

	it('combines permeability with undamped carriers', () => {
		const te = reflection('te', zeroFrequencyMaterial(plasma, 5, undefined));
		te.forEach((r, i) => {
			const q = lattice.s[i];
			const kappa = Math.sqrt(q * q + 5 * wp2);
			expect(r).toBeCloseTo((5 * q - kappa) / (5 * q + kappa), 13);
		});
	});

	it('in a conducting medium is reflected from an insulator with the other sign', () => {
		const medium = zeroFrequencyMaterial(drude, 1, 'drude');
		expect(
			reflection('tm', zeroFrequencyMaterial(insulator, 1, undefined), medium).every((r) => r === -1)
		).toBe(true);
	});
});
