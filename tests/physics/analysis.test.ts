import { describe, expect, it } from 'vitest';
import { evaluate, type MaterialModel } from '../../src/lib/engine/index.ts';
import { between, bromobenzene, metal, silica, vacuum, water } from '../support/analysis-arrangements.ts';

/** Derived to more than 16 digits from the sum of trilogarithms; J at 298.15 K. */
const NON_RETARDED: [
	name: string,
	left: MaterialModel,
	medium: MaterialModel,
	right: MaterialModel,
	A: number
][] = [
	['silica, vacuum, silica', silica, vacuum, silica, 6.533252630877692e-20],
	['silica, water, silica', silica, water, silica, 8.08595878888368e-21],
	['metal, vacuum, metal', metal, vacuum, metal, 2.114879668150348e-19],
	['metal, water, metal', metal, water, metal, 1.446754683773834e-19],
	['metal, vacuum, silica', metal, vacuum, silica, 1.030647051561119e-19],
	['metal, bromobenzene, silica', metal, bromobenzene, silica, -1.163071148826325e-20],
	['silica, bromobenzene, silica', silica, bromobenzene, silica, 4.83608492784833e-21],
	['metal, bromobenzene, metal', metal, bromobenzene, metal, 1.240241209735562e-19]
];

describe('the non-retarded Hamaker coefficient', () => {
	it.each(NON_RETARDED)('of %s', (_, left, medium, right, expected) => {
		const { hamakerJ } = evaluate(between(left, medium, right)).nonRetarded ?? {};
		const off = Math.abs(Number(hamakerJ?.value) / expected - 1);
		// The figures were summed in extended precision: fifteen digits are written here, and the bound must cover the rest.
		expect(off).toBeLessThan(1e-12);
		expect(off).toBeLessThanOrEqual(Number(hamakerJ?.errorBound) + 1e-15);
		expect(hamakerJ?.errorBound).toBeLessThan(1e-9);
	});

	it('is what the effective coefficients tend to at short separations, in warmth and at T = 0', () => {
		for (const temperatureK of [298.15, 0]) {
			const answer = evaluate(between(silica, vacuum, silica, { temperatureK, separationsNm: [0.1] }));
			const limit = Number(answer.nonRetarded?.hamakerJ?.value);
			const { hamakerFromFreeEnergyJ, hamakerFromPressureJ } = answer.points[0].analysis ?? {};
			expect(Math.abs(Number(hamakerFromFreeEnergyJ?.value) / limit - 1)).toBeLessThan(3e-3);
			expect(Math.abs(Number(hamakerFromPressureJ?.value) / limit - 1)).toBeLessThan(3e-3);
		}
	});

	it('says why where there is none', () => {
		const ideal: MaterialModel = { permittivity: { kind: 'idealConductor' } };
		const glass: MaterialModel = { permittivity: { kind: 'constant', value: 2 } };
		expect(evaluate(between(ideal, vacuum, silica)).nonRetarded?.why).toContain('ideal conductor');
		expect(evaluate(between(glass, vacuum, glass)).nonRetarded?.why).toContain('never falls');
		const coated = between(silica, vacuum, silica);
		coated.arrangement.left.layers = [{ of: metal, thicknessNm: 5 }];
		expect(evaluate(coated).nonRetarded?.why).toContain('Layers');
	});

	it('vanishes exactly where both bodies are the medium', () => {
		expect(evaluate(between(silica, silica, silica)).nonRetarded?.hamakerJ).toEqual({
			value: 0,
			errorBound: 0
		});
	});
});

/** -12 pi d^2 F in J, 298.15 K, extended precision. */
const EFFECTIVE: [
	name: string,
	left: MaterialModel,
	medium: MaterialModel,
	right: MaterialModel,
	nm: number,
	A: number
][] = [
	['silica, vacuum', silica, vacuum, silica, 10, 4.139656253800916e-20],
	['silica, water', silica, water, silica, 50, 3.417276574009011e-21],
	['metal, bromobenzene, silica', metal, bromobenzene, silica, 2, -1.158174481360148e-20],
	['metal, vacuum', metal, vacuum, metal, 200, 5.33269413211085e-20]
];

describe('what is read off one point', () => {
	it.each(EFFECTIVE)('effective coefficient of %s', (_, left, medium, right, nm, expected) => {
		const { analysis } = evaluate(between(left, medium, right, { separationsNm: [nm] })).points[0];
		const figure = analysis?.hamakerFromFreeEnergyJ;
		const off = Math.abs(Number(figure?.value) / expected - 1);
		expect(off).toBeLessThan(1e-9);
		expect(off).toBeLessThanOrEqual(Number(figure?.errorBound) + 1e-15);
	});

	it('has the exponents of the curve through its neighbours', () => {
		const step = 1e-4;
		const d = 100;
		const request = between(metal, vacuum, silica, {
			separationsNm: [d * (1 - step), d, d * (1 + step)],
			relativeAccuracy: 1e-11
		});
		const [before, at, after] = evaluate(request).points;
		const width = Math.log((1 + step) / (1 - step));
		const fitted = {
			freeEnergy: Math.log(after.freeEnergyJPerM2 / before.freeEnergyJPerM2) / width,
			pressure: Math.log(after.pressurePa / before.pressurePa) / width
		};
		// A central difference of the logarithms over 2e-4 is good to its third derivative, 1e-8.
		expect(at.analysis?.freeEnergyExponent?.value).toBeCloseTo(fitted.freeEnergy, 6);
		expect(at.analysis?.pressureExponent?.value).toBeCloseTo(fitted.pressure, 6);
	});

	it('is one, with exponents -3 and -4, for ideal conductors at T = 0', () => {
		const ideal: MaterialModel = { permittivity: { kind: 'idealConductor' } };
		const { analysis } = evaluate(between(ideal, vacuum, ideal, { temperatureK: 0, separationsNm: [100] }))
			.points[0];
		for (const [figure, expected] of [
			[analysis?.ratioToIdeal.freeEnergy, 1],
			[analysis?.ratioToIdeal.pressure, 1],
			[analysis?.ratioToIdeal.pressureGradient, 1],
			[analysis?.freeEnergyExponent, -3],
			[analysis?.pressureExponent, -4]
		] as const) {
			expect(Math.abs(Number(figure?.value) / expected - 1)).toBeLessThanOrEqual(Number(figure?.errorBound));
			expect(figure?.errorBound).toBeLessThan(1e-9);
		}
	});

	it('is absent unless it is asked for', () => {
		const plain = evaluate(between(metal, vacuum, metal, { include: [] }));
		expect(plain.points[0]).not.toHaveProperty('analysis');
		expect(plain).not.toHaveProperty('nonRetarded');
	});
});
