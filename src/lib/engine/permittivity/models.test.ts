import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../contract.ts';
import { Refusal } from '../refusal.ts';
import { radPerSFromEv } from '../units.ts';
import { permittivityOnImaginaryAxis, permittivityOnRealAxis, susceptibility } from './evaluator.ts';
import { conducts } from './susceptibility.ts';
import { epsilonShares, type TableModel } from './table.ts';

const eps = (model: PermittivityModel, energyEv: number): number =>
	permittivityOnImaginaryAxis(model)(radPerSFromEv(energyEv));

const tableModel: TableModel = {
	kind: 'table',
	energiesEv: [0.5, 1, 2, 4, 8, 16],
	epsilon2: [20, 5, 2, 4, 1.5, 0.2],
	lowEnd: { kind: 'drude', plasmaEnergyEv: 2, dampingEv: 0.1 },
	highEnd: { kind: 'power', exponent: 3 }
};

const models: [string, PermittivityModel][] = [
	['vacuum', { kind: 'vacuum' }],
	['constant', { kind: 'constant', value: 4 }],
	['drude', { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 }],
	['plasma', { kind: 'plasma', plasmaEnergyEv: 9 }],
	['lorentz', { kind: 'lorentz', terms: [{ strengthEv2: 40, energyEv: 4, dampingEv: 1 }] }],
	['debye', { kind: 'debye', terms: [{ strength: 74, relaxationTimePs: 9 }] }],
	['ninhamParsegian', { kind: 'ninhamParsegian', terms: [{ strength: 1.1, frequencyRadPerS: 2e16 }] }],
	['dcConductivity', { kind: 'dcConductivity', siemensPerM: 1e-4 }],
	['table', tableModel],
	['imaginaryTable', { kind: 'imaginaryTable', frequenciesRadPerS: [1e14, 1e15, 1e16], epsilon: [4, 3, 1.5] }]
];

describe.each(models)('%s', (_, model) => {
	it('never rises with xi and never falls below one', () => {
		const at = permittivityOnImaginaryAxis(model);
		let before = Infinity;
		for (let exponent = 10; exponent < 19; exponent += 0.05) {
			const value = at(10 ** exponent);
			expect(value).toBeGreaterThanOrEqual(1);
			expect(value).toBeLessThanOrEqual(before);
			before = value;
		}
	});

	it('is passive on the real axis where it says anything about it', () => {
		if (model.kind === 'imaginaryTable') {
			expect(() => permittivityOnRealAxis(model)).toThrow(Refusal);
			return;
		}
		const at = permittivityOnRealAxis(model);
		for (const energy of [0.01, 0.3, 0.9, 3, 9, 60]) {
			expect(at(radPerSFromEv(energy)).epsIm).toBeGreaterThanOrEqual(0);
		}
	});
});

describe('a sum', () => {
	it('adds susceptibilities', () => {
		const parts = models.slice(1, 7).map(([, model]) => model);
		const total = parts.reduce((sum, part) => sum + eps(part, 1.3) - 1, 1);
		expect(eps({ kind: 'sum', of: parts }, 1.3) / total - 1).toBeCloseTo(0, 14);
	});

	it('adds plasma frequencies of all that conducts', () => {
		const { atZero } = susceptibility({
			kind: 'sum',
			of: [
				{ kind: 'drude', plasmaEnergyEv: 3, dampingEv: 0.1 },
				{ kind: 'plasma', plasmaEnergyEv: 4 },
				{ kind: 'constant', value: 2 }
			]
		});
		expect(Math.sqrt(atZero.plasmaSquared) / radPerSFromEv(5)).toBeCloseTo(1, 14);
		expect(conducts(atZero)).toBe(true);
	});
});

describe('a Drude metal without damping', () => {
	it('is a plasma', () => {
		const drude: PermittivityModel = { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0 };
		expect(eps(drude, 0.5)).toBe(eps({ kind: 'plasma', plasmaEnergyEv: 9 }, 0.5));
		expect(susceptibility(drude).atZero.square).toBeGreaterThan(0);
	});
});

describe('an oscillator at zero energy', () => {
	it('is a free carrier', () => {
		const lorentz: PermittivityModel = {
			kind: 'lorentz',
			terms: [{ strengthEv2: 81, energyEv: 0, dampingEv: 0.035 }]
		};
		expect(
			eps(lorentz, 0.7) / eps({ kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 }, 0.7) - 1
		).toBeCloseTo(0, 13);
	});
});

describe('a table', () => {
	it('gives shares that add up to one, the low end first at low frequency', () => {
		const low = epsilonShares(tableModel, radPerSFromEv(0.16));
		expect(low.below + low.inside + low.above).toBeCloseTo(1, 14);
		expect(low.below).toBeGreaterThan(0.9);
		expect(epsilonShares(tableModel, radPerSFromEv(10)).inside).toBeGreaterThan(0.8);
	});

	it('sampled from an oscillator gives the oscillator back', () => {
		const lorentz: PermittivityModel = {
			kind: 'lorentz',
			terms: [{ strengthEv2: 40, energyEv: 4, dampingEv: 1 }]
		};
		const exact = permittivityOnRealAxis(lorentz);
		const energiesEv = Array.from({ length: 6000 }, (_, i) => 0.01 * 1e5 ** (i / 5999));
		const sampled: TableModel = {
			kind: 'table',
			energiesEv,
			epsilon2: energiesEv.map((energy) => exact(radPerSFromEv(energy)).epsIm),
			lowEnd: { kind: 'power', exponent: 1 },
			highEnd: { kind: 'power', exponent: 3 }
		};
		for (const energy of [0.01, 0.3, 4, 30]) {
			expect((eps(sampled, energy) - 1) / (eps(lorentz, energy) - 1)).toBeCloseTo(1, 4);
		}
	});

	it.each([0.0999999, 0.1, 0.1000001])(
		'has no step where xi meets the damping of its low end (%d eV)',
		(energy) => {
			expect(eps(tableModel, energy) / eps(tableModel, 0.1) - 1).toBeCloseTo(0, 5);
		}
	);
});

describe('values at imaginary frequency', () => {
	const model: PermittivityModel = {
		kind: 'imaginaryTable',
		frequenciesRadPerS: [1e14, 1e15, 1e16],
		epsilon: [4, 3, 1.5]
	};

	it('are met at their points', () => {
		const at = permittivityOnImaginaryAxis(model);
		expect([1e14, 1e15, 1e16].map(at).map((value) => Math.round(value * 1e12) / 1e12)).toEqual([4, 3, 1.5]);
	});

	it('stand below the first and fall like xi^-2 above the last', () => {
		const at = permittivityOnImaginaryAxis(model);
		expect(at(1e13)).toBe(4);
		expect(at(1e17) - 1).toBeCloseTo(0.005, 12);
	});
});
