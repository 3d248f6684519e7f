import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../contract.ts';
import { permittivityOnImaginaryAxis, permittivityOnRealAxis } from '../permittivity/evaluator.ts';
import { evFromRadPerS, radPerSFromEv } from '../units.ts';
import { oscillatorStrength } from './oscillator-strength.ts';

const end = { kind: 'none' } as const;

describe('oscillatorStrength', () => {
	const models: [string, PermittivityModel][] = [
		['Drude', { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 }],
		['plasma', { kind: 'plasma', plasmaEnergyEv: 8.9 }],
		['Lorentz', { kind: 'lorentz', terms: [{ strengthEv2: 40, energyEv: 4, dampingEv: 2 }] }],
		['Ninham-Parsegian', { kind: 'ninhamParsegian', terms: [{ strength: 1.1, frequencyRadPerS: 2e16 }] }],
		[
			'table between power laws',
			{
				kind: 'table',
				energiesEv: [1, 2, 5, 9],
				epsilon2: [0.5, 3, 1, 0.2],
				lowEnd: { kind: 'power', exponent: 1 },
				highEnd: { kind: 'power', exponent: 3 }
			}
		],
		[
			'table on a Drude end',
			{
				kind: 'table',
				energiesEv: [1, 2, 5, 9],
				epsilon2: [3, 1, 0.4, 0.1],
				lowEnd: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.05 },
				highEnd: { kind: 'power', exponent: 4 }
			}
		],
		[
			'table with a zero and a jump',
			{ kind: 'table', energiesEv: [1, 2, 3, 4], epsilon2: [0, 3, 0, 1], lowEnd: end, highEnd: end }
		]
	];

	// The f-sum is what is left of xi^2 (eps(i xi) - 1) at high xi. At 1e5 eV the slowest tail here, E^-3, still misses a
	// share of about 1e-4; the subtraction of 1 from eps leaves seven digits.
	it.each(models)('is the limit of xi^2 (eps - 1) for a %s', (_name, model) => {
		const xi = radPerSFromEv(1e5);
		const limit = (permittivityOnImaginaryAxis(model)(xi) - 1) * evFromRadPerS(xi) ** 2;
		expect(Math.abs((oscillatorStrength(model) ?? 0) / limit - 1)).toBeLessThan(3e-4);
	});

	it('of a densely sampled Lorentz oscillator is its strength', () => {
		const oscillator: PermittivityModel = {
			kind: 'lorentz',
			terms: [{ strengthEv2: 40, energyEv: 4, dampingEv: 1 }]
		};
		const at = permittivityOnRealAxis(oscillator);
		const energiesEv = Array.from({ length: 4000 }, (_, index) => 1e-2 * 1e5 ** (index / 3999));
		const epsilon2 = energiesEv.map((energy) => at(radPerSFromEv(energy)).epsIm);
		const table: PermittivityModel = {
			kind: 'table',
			energiesEv,
			epsilon2,
			lowEnd: { kind: 'power', exponent: 1 },
			highEnd: { kind: 'power', exponent: 3 }
		};
		// Log-log interpolation misses step^2/12 times the curvature in ln E: 7e-7 times about (2 * 4/1)^2 at the peak.
		expect(Math.abs((oscillatorStrength(table) ?? 0) / 40 - 1)).toBeLessThan(5e-5);
	});

	it.each<[string, PermittivityModel]>([
		['a relaxation', { kind: 'debye', terms: [{ strength: 3, relaxationTimePs: 10 }] }],
		['dc conductivity', { kind: 'dcConductivity', siemensPerM: 1 }],
		['a constant', { kind: 'constant', value: 2 }],
		[
			'an E^-2 tail',
			{
				kind: 'table',
				energiesEv: [1, 2],
				epsilon2: [1, 1],
				lowEnd: end,
				highEnd: { kind: 'power', exponent: 2 }
			}
		]
	])('does not end for %s', (_name, model) => {
		expect(oscillatorStrength(model)).toBe(Number.POSITIVE_INFINITY);
	});

	it('adds up in a sum and is unknown for a table on the imaginary axis', () => {
		const plasma: PermittivityModel = { kind: 'plasma', plasmaEnergyEv: 3 };
		expect(oscillatorStrength({ kind: 'sum', of: [plasma, plasma, { kind: 'vacuum' }] })).toBe(18);
		expect(
			oscillatorStrength({ kind: 'imaginaryTable', frequenciesRadPerS: [1, 2], epsilon: [2, 1] })
		).toBeNull();
	});
});
