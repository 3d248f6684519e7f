import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../contract.ts';
import { prepare } from '../prepare.ts';
import { evaluate } from '../index.ts';
import { Refusal } from '../refusal.ts';
import { radPerSFromEv } from '../units.ts';
import { permittivityIssues } from '../validate-permittivity.ts';
import { permittivityOnImaginaryAxis, permittivityOnRealAxis, susceptibility } from './evaluator.ts';
import { conducts } from './susceptibility.ts';
import { atTemperature, lawAt } from './temperature.ts';

const off = (value: number, figure: number): number => Math.abs(value / figure - 1);
const eps = (model: PermittivityModel, energyEv: number): number =>
	permittivityOnImaginaryAxis(model)(radPerSFromEv(energyEv));

const silica: PermittivityModel = {
	kind: 'ninhamParsegian',
	terms: [
		{ strength: 1.7, frequencyRadPerS: 1.9e14 },
		{ strength: 1.1, frequencyRadPerS: 2.1e16 }
	]
};
const gold: PermittivityModel = { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 };
const plasma: PermittivityModel = { kind: 'plasma', plasmaEnergyEv: 9 };
const absorber: PermittivityModel = {
	kind: 'lorentz',
	terms: [{ strengthEv2: 30, energyEv: 4, dampingEv: 1 }]
};
const KINDS = ['maxwellGarnett', 'bruggeman'] as const;

describe.each(KINDS)('a %s mixture', (kind) => {
	const of = (
		host: PermittivityModel,
		inclusion: PermittivityModel,
		fraction: number
	): PermittivityModel => ({
		kind,
		host,
		inclusion,
		fraction
	});

	it('is its phases at both ends, and its phase where both are alike', () => {
		for (const xi of [0.01, 1, 40]) {
			expect(eps(of(silica, gold, 0), xi)).toBe(eps(silica, xi));
			expect(eps(of(silica, gold, 1), xi)).toBe(eps(gold, xi));
			expect(off(eps(of(silica, silica, 0.37), xi), eps(silica, xi))).toBeLessThan(1e-14);
		}
	});

	it('satisfies its equation', () => {
		const f = 0.3;
		for (const xi of [0.01, 1, 40]) {
			const [e, h, i] = [of(silica, gold, f), silica, gold].map((model) => eps(model, xi));
			const residual =
				kind === 'bruggeman'
					? ((1 - f) * (h - e)) / (h + 2 * e) + (f * (i - e)) / (i + 2 * e)
					: (e - h) / (e + 2 * h) - (f * (i - h)) / (i + 2 * h);
			expect(Math.abs(residual)).toBeLessThan(1e-14);
		}
	});

	it('lies between the bounds of Hashin and Shtrikman', () => {
		for (const f of [0.05, 0.3, 0.5, 0.8]) {
			for (const xi of [0.1, 3]) {
				const [low, high] = [eps(silica, xi), eps(gold, xi)];
				const [first, second] = low < high ? [low, high] : [high, low];
				const share = low < high ? f : 1 - f;
				const bound = (host: number, inclusion: number, g: number): number =>
					host + (3 * g * host * (inclusion - host)) / (3 * host + (1 - g) * (inclusion - host));
				const value = eps(of(silica, gold, f), xi);
				expect(value).toBeGreaterThanOrEqual(bound(first, second, share) * (1 - 1e-12));
				expect(value).toBeLessThanOrEqual(bound(second, first, 1 - share) * (1 + 1e-12));
			}
		}
	});

	it('tends to its static limit', () => {
		for (const f of [0.1, 0.25, 0.5, 0.9]) {
			for (const [host, inclusion] of [
				[silica, gold],
				[gold, silica],
				[gold, plasma],
				[silica, plasma],
				[absorber, silica]
			]) {
				const { atXi, atZero } = susceptibility(of(host, inclusion, f));
				const xi = 1e3;
				const expected = conducts(atZero) ? atZero.slope / xi + atZero.square / xi ** 2 : atZero.finite;
				expect(off(atXi(xi), expected)).toBeLessThan(1e-5);
			}
		}
	});

	it('is passive on the real axis and agrees with the imaginary one by Kramers and Kronig', () => {
		const at = permittivityOnRealAxis(of(absorber, silica, 0.4));
		let sum = 0;
		for (let u = -8; u < 8; u += 0.002) {
			const energy = Math.exp(u);
			const { epsIm } = at(radPerSFromEv(energy));
			expect(epsIm).toBeGreaterThanOrEqual(-1e-15);
			sum += ((2 / Math.PI) * energy * epsIm * energy * 0.002) / (energy ** 2 + 1);
		}
		// The undamped resonances of the silica hide from the sum over a grid; far from them the rest must fit.
		const alone = permittivityOnRealAxis(of(absorber, { kind: 'constant', value: 2.1 }, 0.4));
		let whole = 0;
		for (let u = -8; u < 8; u += 0.002) {
			const energy = Math.exp(u);
			const { epsIm } = alone(radPerSFromEv(energy));
			whole += ((2 / Math.PI) * energy * epsIm * energy * 0.002) / (energy ** 2 + 1);
		}
		const mixed = of(absorber, { kind: 'constant', value: 2.1 }, 0.4);
		const atInfinity = eps(mixed, 1e5);
		expect(off(atInfinity + whole, eps(mixed, 1))).toBeLessThan(2e-4);
		expect(sum).toBeGreaterThan(0);
	});
});

describe('conduction through mixtures', () => {
	const fraction = (kind: (typeof KINDS)[number], f: number) =>
		conducts(susceptibility({ kind, host: silica, inclusion: gold, fraction: f }).atZero);

	it('needs a third of the volume by Bruggeman, and more than spheres by Maxwell Garnett', () => {
		expect([0.3, 0.34].map((f) => fraction('bruggeman', f))).toEqual([false, true]);
		expect([0.3, 0.9].map((f) => fraction('maxwellGarnett', f))).toEqual([false, false]);
	});

	it('is refused on the threshold itself', () => {
		const issues = permittivityIssues(
			{ kind: 'bruggeman', host: silica, inclusion: gold, fraction: 1 / 3 },
			'permittivity'
		);
		expect(issues.map(({ path }) => path)).toEqual(['permittivity.fraction']);
	});
});

const water: PermittivityModel = {
	kind: 'temperatureDependent',
	of: { kind: 'sum', of: [{ kind: 'debye', terms: [{ strength: 74, relaxationTimePs: 9 }] }, silica] },
	rangeK: { from: 273, to: 372 },
	laws: [
		{
			parameter: 'of[0].terms[0].strength',
			law: { kind: 'polynomial', coefficients: [245.4, -0.79069, 0.00072997], scale: 'kelvin' }
		}
	]
};

describe('parameters that follow the temperature', () => {
	it('are polynomials in either scale', () => {
		expect(lawAt({ kind: 'polynomial', coefficients: [1, 2, 3], scale: 'kelvin' }, 2)).toBe(17);
		expect(lawAt({ kind: 'polynomial', coefficients: [5, 1], scale: 'celsius' }, 293.15)).toBeCloseTo(25, 12);
	});

	it('damp a metal by phonons: linear when warm, the fifth power when cold, defects left over', () => {
		const law = (residualShare: number) => ({
			kind: 'blochGruneisen' as const,
			value: 0.035,
			referenceK: 300,
			debyeK: 165,
			residualShare
		});
		expect(lawAt(law(0), 300)).toBeCloseTo(0.035, 15);
		expect(lawAt(law(0), 3000) / lawAt(law(0), 1500)).toBeCloseTo(2, 2);
		expect(off(lawAt(law(0), 4) / lawAt(law(0), 2), 32)).toBeLessThan(1e-6);
		expect(off(lawAt(law(0.1), 1), 0.0035)).toBeLessThan(1e-6);
	});

	it('are set, and held at the ends of their range', () => {
		const strength = (kelvin: number) => {
			const { finite } = susceptibility(atTemperature(water, kelvin)).atZero;
			return finite - 2.8;
		};
		expect(strength(298.15)).toBeCloseTo(245.4 - 0.79069 * 298.15 + 0.00072997 * 298.15 ** 2, 10);
		expect(strength(10)).toBe(strength(273));
		expect(strength(900)).toBe(strength(372));
	});

	it('change the result with the arrangement, and warn outside the range', () => {
		const at = (temperatureK: number) => {
			const request = {
				arrangement: {
					left: { layers: [], substrate: { permittivity: silica } },
					medium: { permittivity: water },
					right: { layers: [], substrate: { permittivity: { kind: 'vacuum' as const } } },
					shape: { kind: 'plates' as const },
					temperatureK
				},
				separationsNm: [100],
				relativeAccuracy: 1e-6,
				include: []
			};
			const fixed = {
				...request,
				arrangement: { ...request.arrangement, medium: { permittivity: atTemperature(water, temperatureK) } }
			};
			return {
				codes: evaluate(request).warnings.map(({ code }) => code),
				point: prepare(request).point(0),
				fixed
			};
		};
		expect(at(298.15).codes).not.toContain('temperature');
		expect(at(250).codes).toContain('temperature');
		const { point, fixed } = at(350);
		expect(point).toEqual(prepare(fixed).point(0));
	});

	it('name their parameter, and stay physical over the range', () => {
		const broken: PermittivityModel = {
			...water,
			laws: [
				{
					parameter: 'of[0].terms[3].strength',
					law: { kind: 'polynomial', coefficients: [1], scale: 'kelvin' }
				}
			]
		};
		expect(permittivityIssues(broken, 'p').map(({ path }) => path)).toEqual(['p.laws[0].parameter']);
		const negative: PermittivityModel = {
			...water,
			laws: [
				{
					parameter: 'of[0].terms[0].strength',
					law: { kind: 'polynomial', coefficients: [300, -1], scale: 'kelvin' }
				}
			]
		};
		expect(() => permittivityOnImaginaryAxis(negative)).toThrow(Refusal);
	});
});
