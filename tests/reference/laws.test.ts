import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import {
	evaluate,
	matsubaraFrequency,
	type ForceRequest,
	type MaterialModel
} from '../../src/lib/engine/index.ts';
import { frequencyResponse } from '../../src/lib/engine/analysis/frequency-response.ts';
import { trilogarithm } from '../../src/lib/engine/numerics/trilogarithm.ts';
import { systemOf } from '../../src/lib/engine/system.ts';
import { between, metal, silica, vacuum, water } from '../support/analysis-arrangements.ts';
import { padeSum } from '../support/pade-sum.ts';

interface Laws {
	taborWinterton: {
		id: string;
		staticEps: number;
		index: number;
		mediumStaticEps: number;
		mediumIndex: number;
		frequencyHz: number;
		value: number;
	}[];
	dielectricFactor: { id: string; epsilon: number; value: number }[];
	padePoles: { id: string; count: number; place: number; pole: number; weight: number }[];
	padeSums: { id: string; count: number; separationNm: number; value: number }[];
	plasmaRatios: { id: string; separationNm: number; plasmaEnergyEv: number; value: number }[];
}

const laws = JSON.parse(readFileSync(new URL('laws.json', import.meta.url), 'utf8')) as Laws;

const BOLTZMANN = 1.380649e-23;
const HBAR = 6.62607015e-34 / (2 * Math.PI);
const SPEED_OF_LIGHT = 299792458;
const RAD_PER_S_PER_EV = 1.602176634e-19 / HBAR;
const off = (value: number, figure: number) => Math.abs(value / figure - 1);

const plasma: MaterialModel = {
	permittivity: { kind: 'plasma', plasmaEnergyEv: 9 },
	zeroFrequency: 'plasma'
};
const constant = (value: number): MaterialModel => ({ permittivity: { kind: 'constant', value } });
const pointOf = (request: ForceRequest) => evaluate(request).points[0];
const plates = (
	both: MaterialModel,
	nm: number,
	temperatureK: number,
	include: ForceRequest['include'] = []
) =>
	pointOf(
		between(both, vacuum, both, { separationsNm: [nm], temperatureK, relativeAccuracy: 1e-11, include })
	);
const idealPressure = (d: number) => (-(Math.PI ** 2) * HBAR * SPEED_OF_LIGHT) / (240 * d ** 4);

describe('one oscillator across a medium: the form of Tabor and Winterton', () => {
	/** A static part far below the first term, and one electronic oscillator. */
	const substance = (staticEps: number, index: number, frequencyHz: number): MaterialModel => ({
		permittivity: {
			kind: 'sum',
			of: [
				{
					kind: 'debye',
					terms: [{ strength: staticEps - index ** 2, relaxationTimePs: 1e12 }]
				},
				{
					kind: 'ninhamParsegian',
					terms: [{ strength: index ** 2 - 1, frequencyRadPerS: 2 * Math.PI * frequencyHz }]
				}
			]
		}
	});

	it.each(laws.taborWinterton)(
		'$id',
		({ staticEps, index, mediumStaticEps, mediumIndex, frequencyHz, value }) => {
			const across = mediumStaticEps === 1 ? vacuum : substance(mediumStaticEps, mediumIndex, frequencyHz);
			const body = substance(staticEps, index, frequencyHz);
			const { nonRetarded } = evaluate(between(body, across, body, { temperatureK: 300 }));
			// The form takes the sum over n >= 1 for the integral from zero: half of the term at zero frequency too much.
			const fast = (index ** 2 - mediumIndex ** 2) / (index ** 2 + mediumIndex ** 2);
			const still = (staticEps - mediumStaticEps) / (staticEps + mediumStaticEps);
			const half = 0.75 * BOLTZMANN * 300;
			const whole = Number(nonRetarded?.hamakerJ?.value) + half * trilogarithm(fast * fast);
			// ... and it takes each Li_3(x) for x, which is less by Li_3(x)/x at most.
			const largest = Math.max(fast * fast, still * still);
			expect(whole / value).toBeGreaterThan(1);
			expect(whole / value).toBeLessThan(trilogarithm(largest) / largest);
			// To first order in x the two are the same but for x^2/8: the electronic part has a mean of x^2 over x of 5/8.
			const electronic = value - half * still * still;
			const second =
				half * (trilogarithm(still * still) - still * still) + (electronic * (5 / 8) * fast * fast) / 8;
			expect(Math.abs(whole - value - second) / value).toBeLessThan(fast ** 4 / 20);
		}
	);
});

describe('limits at T = 0', () => {
	it('plasma half-spaces: the non-retarded coefficient and the slopes of the reduction factors', () => {
		const { nonRetarded } = evaluate(between(plasma, vacuum, plasma, { temperatureK: 0 }));
		const share = Number(nonRetarded?.hamakerJ?.value) / (HBAR * 9 * RAD_PER_S_PER_EV);
		expect(off(share, 0.1472229213798901)).toBeLessThan(1e-10);
		// eta_E and eta_F over d/lambda_p as d falls: 120 a/pi^2 and 80 a/pi^2 (Lambrecht and Reynaud 2000: 1.790, 1.193)
		const slopes = (nm: number) => {
			const { freeEnergyJPerM2, pressurePa } = plates(plasma, nm, 0);
			const d = nm * 1e-9;
			const share = (d * 9 * RAD_PER_S_PER_EV) / (2 * Math.PI * SPEED_OF_LIGHT);
			const ideal = (idealPressure(d) * d) / 3;
			return [freeEnergyJPerM2 / ideal / share, pressurePa / idealPressure(d) / share];
		};
		[1.790016078419196, 1.193344052279464].forEach((limit, q) => {
			// what is left falls with d faster than linearly
			const [near, far] = [slopes(0.1)[q], slopes(0.2)[q]].map((slope) => off(slope, limit));
			expect(near).toBeLessThan(1e-3);
			expect(near).toBeLessThan(far / 2);
		});
	});

	const factor = (epsilon: number) => {
		const { pressurePa } = plates(constant(epsilon), 100, 0);
		return pressurePa / idealPressure(1e-7) / ((epsilon - 1) / (epsilon + 1)) ** 2;
	};

	it.each(laws.dielectricFactor)('$id: dielectrics without dispersion', ({ epsilon, value }) => {
		expect(off(factor(epsilon), value)).toBeLessThan(1e-10);
	});

	it('rarefied bodies: 69/(2 pi^4)', () => {
		const [near, far] = [factor(1 + 1e-4), factor(1 + 2e-4)];
		expect(off(2 * near - far, 0.3541763877866096)).toBeLessThan(1e-8);
	});
});

describe('sums by the poles of a Pade form', () => {
	it.each(laws.padePoles)('$id has its pole and its weight', ({ count, place, pole, weight }) => {
		const { poles, weights } = padeSum(count);
		expect(off(poles[place - 1], pole)).toBeLessThan(1e-13);
		expect(off(weights[place - 1], weight)).toBeLessThan(1e-12);
	});

	/** The integrand of one frequency at places between the Matsubara frequencies, summed by another rule. */
	const deviation = (count: number, nm: number): number => {
		const request = between(metal, vacuum, metal, {
			separationsNm: [nm],
			temperatureK: 300,
			relativeAccuracy: 1e-11,
			include: ['breakdown']
		});
		const d = nm * 1e-9;
		const responder = frequencyResponse(systemOf(request), d);
		const { poles, weights } = padeSum(count);
		const unit = matsubaraFrequency(1, 300) / (2 * Math.PI);
		const scale = -(BOLTZMANN * 300) / (8 * Math.PI * d ** 3);
		const sum = poles.reduce((total, x, j) => total + weights[j] * responder.at(x * unit).pressure, 0);
		const { breakdown, pressurePa } = pointOf(request);
		const parts = breakdown?.pressurePa;
		return (Number(parts?.zeroTe) + Number(parts?.zeroTm) + scale * sum) / pressurePa - 1;
	};

	it.each(laws.padeSums)('$id: $count poles against the sum at $separationNm nm', (figure) => {
		// Eleven digits are what the sum is asked for.
		expect(Math.abs(deviation(figure.count, figure.separationNm) - figure.value)).toBeLessThan(2e-11);
	});
});

describe('readings and sensitivities at 300 K', () => {
	it.each(laws.plasmaRatios)('$id: a Drude metal of $plasmaEnergyEv eV over one of 9 eV', (figure) => {
		const other: MaterialModel = {
			permittivity: { kind: 'drude', plasmaEnergyEv: figure.plasmaEnergyEv, dampingEv: 0.035 }
		};
		const [changed, own] = [other, metal].map((one) => plates(one, figure.separationNm, 300).pressurePa);
		expect(off(changed / own, figure.value)).toBeLessThan(1e-10);
	});

	it('the local exponent of a Drude metal at 200 nm', () => {
		const { analysis } = plates(metal, 200, 300, ['analysis']);
		expect(off(-Number(analysis?.pressureExponent?.value), 3.637521080215577)).toBeLessThan(1e-10);
	});

	it('the static share of silica-like bodies across a polar liquid at 10 nm', () => {
		const { breakdown, pressurePa } = pointOf(
			between(silica, water, silica, { relativeAccuracy: 1e-11, include: ['breakdown'] })
		);
		const still = Number(breakdown?.pressurePa.zeroTe) + Number(breakdown?.pressurePa.zeroTm);
		expect(off(still / pressurePa, 0.4636646285931566)).toBeLessThan(1e-9);
	});
});

describe('curved bodies', () => {
	/** Ideal conductors at T = 0: theta of the force of a sphere, of its gradient, and of the energy of a cylinder. */
	const THETA = { force: -0.846545169756711, gradient: -0.564363446504474, cylinder: -0.4810301131711407 };
	const ideal: MaterialModel = { permittivity: { kind: 'idealConductor' } };
	const errorOf = (shape: ForceRequest['arrangement']['shape']) =>
		Number(
			pointOf(between(ideal, vacuum, ideal, { shape, temperatureK: 0, separationsNm: [100] })).shapeError
		);

	it('state an error of the proximity approximation no smaller than the leading correction of ideal ones', () => {
		const sphere = errorOf({ kind: 'spherePlate', radiusUm: 100 }) / 1e-3;
		expect(sphere).toBeGreaterThan(-THETA.force);
		expect(sphere).toBeGreaterThan(-THETA.gradient);
		expect(sphere).toBeLessThan(-1.02 * THETA.force);
		const cylinder = errorOf({ kind: 'cylinderPlate', radiusUm: 100 }) / 1e-3;
		expect(cylinder).toBeGreaterThan(-THETA.cylinder);
		expect(cylinder).toBeLessThan(-1.05 * THETA.cylinder);
	});

	/** int F(d + x^2/2R) dx with x = sqrt(2 R d) sinh v, by the trapezoidal rule; and the force as its derivative. */
	const energyPerLength = (both: MaterialModel, radius: number, nm: number, temperatureK: number): number => {
		const step = 0.1;
		// as far as the engine computes; beyond it lies 1e-8 of the integral
		const count = Math.floor(Math.acosh(Math.sqrt(1e6 / nm)) / step) + 1;
		const vs = Array.from({ length: count }, (_, i) => i * step);
		const request = between(both, vacuum, both, {
			separationsNm: vs.map((v) => nm * Math.cosh(v) ** 2),
			temperatureK
		});
		const sum = evaluate(request).points.reduce(
			(total, { freeEnergyJPerM2 }, i) => total + (i === 0 ? 1 : 2) * Math.cosh(vs[i]) * freeEnergyJPerM2,
			0
		);
		return step * Math.sqrt(2 * radius * nm * 1e-9) * sum;
	};

	it.each([
		['ideal conductors at 1 um', ideal, 1000, 0, -7.22038326925918e-15, 3e-8],
		['Drude plates at 100 nm', metal, 100, 300, -1.265029280572253e-12, 1e-7]
	] as const)('hold the energy a length of a cylinder above a plate: %s', (...row) => {
		const [, both, nm, temperatureK, figure, tolerance] = row;
		expect(off(energyPerLength(both, 1e-4, nm, temperatureK), figure)).toBeLessThan(tolerance);
		const { forceN } = pointOf(
			between(both, vacuum, both, {
				shape: { kind: 'cylinderPlate', radiusUm: 100 },
				separationsNm: [nm],
				temperatureK
			})
		);
		const h = nm / 200;
		const rise = [h, 2 * h].map(
			(step) =>
				(energyPerLength(both, 1e-4, nm + step, temperatureK) -
					energyPerLength(both, 1e-4, nm - step, temperatureK)) /
				(2 * step * 1e-9)
		);
		// In warmth the energy beyond falls only like d^-2.
		expect(off(-(4 * rise[0] - rise[1]) / 3, Number(forceN))).toBeLessThan(1e-6);
	});
});
