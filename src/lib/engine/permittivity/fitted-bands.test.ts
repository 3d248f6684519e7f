import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../contract.ts';
import { radPerSFromEv } from '../units.ts';
import { permittivityOnImaginaryAxis, permittivityOnRealAxis, susceptibility } from './evaluator.ts';
import { ultravioletPair } from './sellmeier.ts';

const off = (value: number, figure: number): number => Math.abs(value / figure - 1);
const eps = (model: PermittivityModel, energyEv: number): number =>
	permittivityOnImaginaryAxis(model)(radPerSFromEv(energyEv));

const spread: PermittivityModel = {
	kind: 'brendelBormann',
	terms: [{ strengthEv2: 25, energyEv: 3, dampingEv: 0.4, widthEv: 0.6 }]
};
const amorphous: PermittivityModel = {
	kind: 'taucLorentz',
	terms: [{ amplitudeEv: 100, energyEv: 4, broadeningEv: 2, gapEv: 1.5 }]
};
const constantDipole: PermittivityModel = {
	kind: 'codyLorentz',
	terms: [{ amplitudeEv: 100, energyEv: 4, broadeningEv: 2, gapEv: 1.5, transitionEv: 1 }]
};

describe('Brendel-Bormann oscillators', () => {
	// Mean of the Lorentz term over the normal distribution, by quadrature with 16 digits.
	it.each([
		[0.1, 3.183005778134124],
		[1, 2.632499311557819],
		[10, 0.2207596808738588]
	])('at xi = %f eV', (energyEv, figure) => {
		expect(off(susceptibility(spread).atXi(radPerSFromEv(energyEv)), figure)).toBeLessThan(1e-13);
	});

	// The printed formula with 40 digits.
	it.each([
		[0.5, 3.3415188832151594, 0.1292312906249837],
		[3, -0.29676707190974927, 6.829813091124885],
		[7, -0.6331459404890125, 0.04558251750454013]
	])('on the real axis at %f eV', (energyEv, re, im) => {
		const at = permittivityOnRealAxis(spread)(radPerSFromEv(energyEv));
		expect(off(at.epsRe - 1, re)).toBeLessThan(1e-12);
		expect(off(at.epsIm, im)).toBeLessThan(1e-12);
	});

	it('take a finite static value, without the resonances next to zero', () => {
		const { atZero } = susceptibility(spread);
		expect(off(atZero.finite, 3.206212893953562)).toBeLessThan(1e-10);
		expect([atZero.slope, atZero.square, atZero.plasmaSquared]).toEqual([0, 0, 0]);
	});

	it('turn into a Lorentz oscillator as the width falls', () => {
		const narrow: PermittivityModel = {
			kind: 'brendelBormann',
			terms: [{ strengthEv2: 25, energyEv: 3, dampingEv: 0.4, widthEv: 1e-5 }]
		};
		const lorentz: PermittivityModel = {
			kind: 'lorentz',
			terms: [{ strengthEv2: 25, energyEv: 3, dampingEv: 0.4 }]
		};
		for (const xi of [0.01, 1, 30]) expect(off(eps(narrow, xi), eps(lorentz, xi))).toBeLessThan(1e-9);
	});
});

describe('band models of amorphous matter', () => {
	// Kramers-Kronig integrals by independent quadrature, 16 digits.
	it.each([
		['Tauc-Lorentz', amorphous, 0, 8.315201141429649],
		['Tauc-Lorentz', amorphous, 1, 7.870032656959633],
		['Tauc-Lorentz', amorphous, 10, 2.251623963949187],
		['Cody-Lorentz', constantDipole, 0, 17.00976761273929],
		['Cody-Lorentz', constantDipole, 1, 15.93414577005291],
		['Cody-Lorentz', constantDipole, 10, 3.456714741686056]
	])('%s at xi', (_, model, energyEv, figure) => {
		expect(off(1 + susceptibility(model).atXi(radPerSFromEv(energyEv)), figure)).toBeLessThan(1e-12);
	});

	// Principal values by symmetric quadrature around the pole, 20 digits.
	it.each([
		[0.5, 7.43918273502049, 0],
		[1.499, 8.73893033543951, 0],
		[3, 14.7237107744587, 7.05882352941176]
	])('Tauc-Lorentz on the real axis at %f eV', (energyEv, re, im) => {
		const at = permittivityOnRealAxis(amorphous)(radPerSFromEv(energyEv));
		expect(off(at.epsRe - 1, re)).toBeLessThan(1e-10);
		expect(Math.abs(at.epsIm - im)).toBeLessThan(1e-12);
	});

	it.each([0.01, 0.3, 20])('keep their sum of strengths when the broadening is %f eV', (broadeningEv) => {
		const model: PermittivityModel = {
			kind: 'taucLorentz',
			terms: [{ amplitudeEv: 100, energyEv: 4, broadeningEv, gapEv: 1.5 }]
		};
		const { atXi } = susceptibility(model);
		// Far above everything xi^2 (eps - 1) tends to the strength, with a correction of order 1/xi.
		const [near, far] = [1e9, 2e9].map((xi) => atXi(radPerSFromEv(xi)) * xi ** 2);
		expect(off(near, far)).toBeLessThan(1e-6);
	});
});

describe('an index formula by its Cauchy plot', () => {
	// Fused silica, Malitson (1965); the pair is that of the library's own derivation, four digits.
	const silica = {
		kind: 'sellmeier' as const,
		constant: 0,
		bandUm: { from: 0.35, to: 0.7 },
		terms: [
			{ strength: 0.6961663, wavelengthUm: 0.0684043 },
			{ strength: 0.4079426, wavelengthUm: 0.1162414 },
			{ strength: 0.8974794, wavelengthUm: 9.896161 }
		]
	};

	it('gives the ultraviolet pair of the library', () => {
		const pair = ultravioletPair(silica);
		expect(off(pair?.strength ?? 0, 1.1037)).toBeLessThan(2e-4);
		expect(off(pair?.frequency ?? 0, 2.0893e16)).toBeLessThan(2e-3);
	});

	it('lies below the formula continued as it stands, and at the measured index', () => {
		const direct: PermittivityModel = {
			kind: 'ninhamParsegian',
			terms: silica.terms.map(({ strength, wavelengthUm }) => ({
				strength,
				frequencyRadPerS: radPerSFromEv(1.239841984332003 / wavelengthUm)
			}))
		};
		expect(eps(silica, 30)).toBeLessThan(eps(direct, 30));
		const { epsRe } = permittivityOnRealAxis(silica)(radPerSFromEv(1.239841984332003 / 0.5893));
		expect(Math.abs(Math.sqrt(epsRe) - 1.4584)).toBeLessThan(2e-4);
	});
});
