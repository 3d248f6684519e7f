import { describe, expect, it } from 'vitest';
import {
	RAD_PER_S_PER_EV,
	matsubaraFrequency,
	permittivityOnImaginaryAxis,
	radPerSFromHz,
	radPerSFromPerCm,
	radPerSFromWavelength,
	type PermittivityModel
} from '../../src/lib/engine/index.ts';
import { ONE_ELECTRON_EV2 } from '../../src/lib/engine/checks/f-sum-rule.ts';
import { oscillatorStrength } from '../../src/lib/engine/checks/oscillator-strength.ts';
import { AVOGADRO, BOLTZMANN, REDUCED_PLANCK, SPEED_OF_LIGHT } from '../../src/lib/engine/constants.ts';
import { permittivityOnRealAxis, susceptibility } from '../../src/lib/engine/permittivity/evaluator.ts';

/**
 * Figures worked out for this project with 25 to 60 digits, independent of the engine; the unit figures follow from the
 * exact constants of the SI (2019). Each tolerance is that of the digits given.
 */

const off = (value: number, figure: number) => Math.abs(value / figure - 1);

describe('units and frequencies', () => {
	it.each([
		['1 eV in rad/s', RAD_PER_S_PER_EV, 1.519267447878626e15],
		['1 eV as an ordinary frequency', radPerSFromHz(2.417989242084918e14), 1.519267447878626e15],
		['1 eV as a wave number', radPerSFromPerCm(8.065543937349212e3), 1.519267447878626e15],
		['1 eV as a vacuum wavelength', radPerSFromWavelength(1.239841984332003e-6), 1.519267447878626e15],
		[
			'a plasma energy of 9 eV as a wavelength',
			radPerSFromWavelength(1.377602204813336e-7),
			9 * RAD_PER_S_PER_EV
		],
		['hbar', REDUCED_PLANCK, 1.054571817646156e-34],
		['hbar c', REDUCED_PLANCK * SPEED_OF_LIGHT, 3.16152677349669e-26],
		[
			'the thermal length at 300 K',
			(REDUCED_PLANCK * SPEED_OF_LIGHT) / (BOLTZMANN * 300),
			7.63294840203578e-6
		],
		['the first Matsubara frequency at 300 K', matsubaraFrequency(1, 300), 2.467790253640998e14],
		['the same at 298.15 K', matsubaraFrequency(1, 298.15), 2.452572213743545e14],
		['the same at 293.15 K', matsubaraFrequency(1, 293.15), 2.411442376182862e14]
	])('%s', (_, value, figure) => {
		expect(off(value, figure)).toBeLessThan(2e-15);
	});
});

const sixPoints: PermittivityModel = {
	kind: 'table',
	energiesEv: [0.5, 1, 2, 4, 8, 16],
	epsilon2: [20, 5, 2, 4, 1.5, 0.2],
	lowEnd: { kind: 'drude', plasmaEnergyEv: 2, dampingEv: 0.1 },
	highEnd: { kind: 'power', exponent: 3 }
};

const bare = (energiesEv: number[], epsilon2: number[]): PermittivityModel => ({
	kind: 'table',
	energiesEv,
	epsilon2,
	lowEnd: { kind: 'none' },
	highEnd: { kind: 'none' }
});

const lorentz: PermittivityModel = {
	kind: 'lorentz',
	terms: [{ strengthEv2: 16, energyEv: 3, dampingEv: 0.5 }]
};

it('a Drude metal of 9.0 eV / 35 meV has the dc conductivity eps_0 wp^2/gamma', () => {
	const { slope } = susceptibility({ kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 }).atZero;
	expect(off(8.8541878188e-12 * slope, 31131492.164886)).toBeLessThan(1e-12);
});

describe('eps(i xi), energies in eV', () => {
	const xi1 = 0.1624329052193415;
	it.each<[string, PermittivityModel, number, number, number]>([
		[
			'Drude 9.0 eV / 35 meV at xi_1 of 300 K',
			{ kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
			xi1,
			2526.756449675514,
			1e-13
		],
		['plasma 9.0 eV at xi_1 of 300 K', { kind: 'plasma', plasmaEnergyEv: 9 }, xi1, 3070.99024035524, 1e-13],
		['a Lorentz oscillator', lorentz, 1.2, 2.449275362318841, 1e-14],
		['a six-point table with both ends, low xi', sixPoints, 0.1624329, 102.8347056356431, 1e-11],
		['the same at 1 eV', sixPoints, 1, 9.33583632660866, 1e-11],
		['the same at 10 eV', sixPoints, 10, 1.629013560496308, 1e-11],
		['a table that begins with a zero', bare([1, 2, 4], [0, 3, 1]), 1, 1 + 1.119264170358953, 1e-12],
		[
			'one power-law segment omega^-2.7',
			bare([2, 5], [2 ** -2.7, 5 ** -2.7]),
			3,
			1 + 1.468687486730196e-2,
			1e-13
		],
		['the degenerate segment omega^-2', bare([2, 5], [2 ** -2, 5 ** -2]), 3, 1 + 3.08113464394928e-2, 1e-13]
	])('%s', (_, model, xiEv, figure, tolerance) => {
		expect(off(permittivityOnImaginaryAxis(model)(xiEv * RAD_PER_S_PER_EV), figure)).toBeLessThan(tolerance);
	});
});

describe("sums over eps''", () => {
	it('of a straight segment, 1.5 - 0.2 E from 2 to 5 eV, as the sum of two that end at zero', () => {
		const falling = bare([2, 5], [1.1, 0]);
		const rising = bare([2, 5], [0, 0.5]);
		const chi = permittivityOnImaginaryAxis({ kind: 'sum', of: [falling, rising] })(3 * RAD_PER_S_PER_EV) - 1;
		expect(off(chi, 0.2460426616483167)).toBeLessThan(1e-12);
	});

	it('count the strength of an oscillator up to 10 eV', () => {
		const at = permittivityOnRealAxis(lorentz);
		const upTo10 = (steps: number) => {
			const energiesEv = Array.from({ length: steps + 1 }, (_, i) => 0.001 * 1e4 ** (i / steps));
			const epsilon2 = energiesEv.map((energy) => at(energy * RAD_PER_S_PER_EV).epsIm);
			return Number(oscillatorStrength(bare(energiesEv, epsilon2))) / 16;
		};
		// What the points miss of the curve between them falls with the square of their spacing.
		const [coarse, fine] = [upTo10(2000), upTo10(4000)];
		expect(off(fine, 0.9661231852067317)).toBeLessThan(1e-4);
		expect(off((4 * fine - coarse) / 3, 0.9661231852067317)).toBeLessThan(1e-7);
	});

	it('give the density of electrons that belongs to a plasma energy of 9 eV', () => {
		const perCubicMetre = (81 / ONE_ELECTRON_EV2) * AVOGADRO * 1e6;
		// The constant is kept with seven digits.
		expect(off(perCubicMetre, 5.87449343944773e28)).toBeLessThan(1e-7);
	});
});
