import { describe, expect, it } from 'vitest';
import {
	evaluate,
	permittivityOnImaginaryAxis,
	type ForceRequest,
	type MaterialModel,
	type PermittivityModel,
	type Sensitivity
} from '../../src/lib/engine/index.ts';
import { frequencyResponse } from '../../src/lib/engine/analysis/frequency-response.ts';
import { matsubaraFrequency } from '../../src/lib/engine/lifshitz/matsubara.ts';
import { systemOf } from '../../src/lib/engine/system.ts';
import { between, bromobenzene, metal, silica, vacuum, water } from '../support/analysis-arrangements.ts';

const ask = (request: ForceRequest): Sensitivity => {
	const { sensitivity } = evaluate({ ...request, include: ['sensitivity'] }).points[0];
	if (!sensitivity) throw new Error('no sensitivity in the answer');
	return sensitivity;
};
const atNm = (nm: number, left = metal, medium = vacuum, right = metal, temperatureK = 300) =>
	between(left, medium, right, { separationsNm: [nm], temperatureK, relativeAccuracy: 1e-11 });

/** One of two equal Drude plates (9.0 eV, 35 meV), 100 nm, 300 K; analytic derivative in extended precision, Pa. */
const DERIVATIVES: [n: number, expected: number][] = [
	[1, -1.203582481217285e-5],
	[10, -1.317752279628224e-3],
	[40, -5.657043262684042e-4]
];
/** The kernel of the same plate in Pa/eV. */
const KERNEL: [energyEv: number, expected: number][] = [
	[0.5, -2.653180486978406e-3],
	[2, -5.525316723818869e-3],
	[10, -3.333090271632903e-3]
];

describe('derivatives to eps(i xi)', () => {
	it.each(DERIVATIVES)('of the term n = %i of a Drude plate', (n, expected) => {
		const responder = frequencyResponse(systemOf(atNm(100)), 1e-7);
		const found = responder.at(matsubaraFrequency(n, 300));
		const scale = -(1.380649e-23 * 300) / (8 * Math.PI * 1e-7 ** 3);
		expect(Math.abs((scale * found.pressureBy[0]) / expected - 1)).toBeLessThan(1e-11);
	});

	it.each(KERNEL)('as a kernel at %f eV', (energyEv, expected) => {
		const { xiRadPerS, weight, places } = ask(atNm(100));
		const omega = energyEv * 1.519267447878626e15;
		const sum = xiRadPerS.reduce(
			(total, xi, i) => total + (weight[i] * places[0].pressurePa[i] * omega) / (omega ** 2 + xi ** 2),
			0
		);
		expect(Math.abs(((2 / Math.PI) * 1.519267447878626e15 * sum) / expected - 1)).toBeLessThan(1e-8);
	});

	it('with the same figure on its own energies', () => {
		const { kernel } = ask(atNm(100)).places[0];
		const ten = kernel.energiesEv.findIndex((energy) => Math.abs(energy / 10 - 1) < 1e-12);
		expect(Math.abs(kernel.pressurePaPerEv[ten] / KERNEL[2][1] - 1)).toBeLessThan(1e-8);
		expect(kernel.errorBound).toBeLessThan(1e-6);
		// omega K eps''/P with eps'' of the Drude model.
		const [wp, gamma] = [9, 0.035];
		const im = (wp ** 2 * gamma) / (10 * (10 ** 2 + gamma ** 2));
		const { pressurePa } = evaluate(atNm(100)).points[0];
		expect(Number(kernel.pressureWeight[ten]) / ((10 * KERNEL[2][1] * im) / pressurePa)).toBeCloseTo(1, 8);
	});

	/** d ln|P|/d ln wp of both plates at 300 K: differences of the full sum, extrapolated. */
	it.each([
		[100, 0.5654417078374853],
		[1000, 0.1105615409014559]
	])('as an elasticity to the plasma energy at %i nm', (nm, expected) => {
		const { places } = ask(atNm(nm));
		const plates = places.filter(({ place }) => place !== 'medium');
		const sum = plates.reduce((total, { elasticity }) => total + 2 * Number(elasticity.pressure?.value), 0);
		expect(Math.abs(sum / expected - 1)).toBeLessThan(1e-8);
		for (const { elasticity } of plates) expect(elasticity.pressure?.errorBound).toBeLessThan(1e-6);
	});

	it('as an elasticity to the damping at 100 nm', () => {
		const { xiRadPerS, weight, places } = ask(atNm(100));
		const pressure = evaluate(atNm(100)).points[0].pressurePa;
		const chi = permittivityOnImaginaryAxis(metal.permittivity);
		const gamma = 0.035 * 1.519267447878626e15;
		const sum = xiRadPerS.reduce(
			(total, xi, i) =>
				total - 2 * weight[i] * places[0].pressurePa[i] * (chi(xi) - 1) * (gamma / (xi + gamma)),
			0
		);
		expect(Math.abs(sum / pressure / -0.008986054506697483 - 1)).toBeLessThan(1e-7);
	});
});

/** A weak narrow oscillator added to a place moves the result by what the derivatives say, to first order. */
const PROBE: PermittivityModel = {
	kind: 'ninhamParsegian',
	terms: [{ strength: 1e-4, frequencyRadPerS: 5e15 }]
};
const shifted = (material: MaterialModel): MaterialModel => ({
	...material,
	permittivity: { kind: 'sum', of: [material.permittivity, PROBE] }
});

const coated = (temperatureK: number, options: Partial<ForceRequest['arrangement']> = {}): ForceRequest => {
	const request = between(metal, water, silica, {
		separationsNm: [20],
		temperatureK,
		relativeAccuracy: 1e-11,
		...options
	});
	request.arrangement.left.layers = [
		{ of: silica, thicknessNm: 3 },
		{ of: bromobenzene, thicknessNm: 8 }
	];
	request.arrangement.right.layers = [{ of: metal, thicknessNm: 5 }];
	return request;
};

const magnetic: MaterialModel = { ...silica, permeability: { kind: 'constant', value: 1.5 } };
const ARRANGEMENTS: [string, () => ForceRequest][] = [
	['half-spaces in a liquid', () => atNm(30, metal, bromobenzene, silica)],
	['stacks in warm water', () => coated(300)],
	['stacks at T = 0', () => coated(0)],
	['stacks in salt water', () => coated(300, { debyeLengthNm: 5 })],
	['a magnetic body', () => atNm(50, metal, bromobenzene, magnetic)],
	[
		'an ideal conductor behind a film',
		() => {
			const request = atNm(40, { permittivity: { kind: 'idealConductor' } }, vacuum, silica);
			request.arrangement.left.layers = [{ of: silica, thicknessNm: 10 }];
			return request;
		}
	]
];

describe.each(ARRANGEMENTS)('differences of the full sum: %s', (_, make) => {
	const places = ask(make()).places.map(({ place }) => place);

	it.each(places)('at %s', (path) => {
		const request = make();
		const { xiRadPerS, weight, places } = ask(request);
		const derivative = places.find(({ place }) => place === path);
		const probe = permittivityOnImaginaryAxis(PROBE);
		const predicted = (row: readonly number[], still: number) =>
			xiRadPerS.reduce((sum, xi, i) => sum + weight[i] * row[i] * (probe(xi) - 1), 0) + still * 1e-4;
		const results = [false, true].map((probed) => {
			const changed = make();
			if (probed) place(changed, path);
			return evaluate(changed).points[0];
		});
		const moved = {
			freeEnergy: results[1].freeEnergyJPerM2 - results[0].freeEnergyJPerM2,
			pressure: results[1].pressurePa - results[0].pressurePa
		};
		// The probe is finite: its second order is 1e-4 of the first, and the differences have eight digits.
		const still = derivative?.static;
		expect(
			predicted(derivative?.freeEnergyJPerM2 ?? [], still?.freeEnergyJPerM2 ?? 0) / moved.freeEnergy
		).toBeCloseTo(1, 3);
		expect(predicted(derivative?.pressurePa ?? [], still?.pressurePa ?? 0) / moved.pressure).toBeCloseTo(
			1,
			3
		);
	});
});

function place(request: ForceRequest, path: string): void {
	const { arrangement } = request;
	const [side, rest] = path.split('.');
	if (side === 'medium') {
		arrangement.medium = shifted(arrangement.medium);
		return;
	}
	const body = arrangement[side as 'left' | 'right'];
	const layer = /layers\[(\d+)\]/.exec(rest)?.[1];
	if (layer === undefined) body.substrate = shifted(body.substrate);
	else body.layers[Number(layer)].of = shifted(body.layers[Number(layer)].of);
}

describe('what rests on extrapolation', () => {
	const table: MaterialModel = {
		permittivity: {
			kind: 'table',
			energiesEv: [0.1, 0.3, 1, 3, 10, 30],
			epsilon2: [700, 90, 6, 4, 2, 0.2],
			lowEnd: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
			highEnd: { kind: 'power', exponent: 3 }
		}
	};

	it('adds up to the elasticity of the whole table', () => {
		const [plate] = ask(atNm(100, table, vacuum, silica)).places;
		const parts = [plate.reliance?.below, plate.reliance?.inside, plate.reliance?.above];
		const sum = parts.reduce((total, part) => total + Number(part?.pressure?.value), 0);
		expect(sum / Number(plate.elasticity.pressure?.value)).toBeCloseTo(1, 10);
		expect(parts.every((part) => Number(part?.pressure?.value) > 0)).toBe(true);
	});

	it('grows at the low end with the separation', () => {
		// As a share of the whole: the elasticity itself falls, since a metal that reflects wholly cannot reflect more.
		const low = (nm: number) => {
			const [{ reliance, elasticity }] = ask(atNm(nm, table, vacuum, silica)).places;
			return Number(reliance?.below.pressure?.value) / Number(elasticity.pressure?.value);
		};
		expect(low(1000)).toBeGreaterThan(low(100));
	});

	it('is not told of closed forms', () => {
		expect(ask(atNm(100)).places[0].reliance).toBeUndefined();
	});
});

describe('the Matsubara terms', () => {
	const termsOf = (request: ForceRequest) =>
		evaluate({ ...request, include: ['terms', 'breakdown'] }).points[0];

	it('add up to the total, n = 0 among them', () => {
		const { terms, pressurePa, freeEnergyJPerM2, breakdown } = termsOf(coated(300));
		for (const [series, total, parts] of [
			[terms?.pressurePa, pressurePa, breakdown?.pressurePa],
			[terms?.freeEnergyJPerM2, freeEnergyJPerM2, breakdown?.freeEnergyJPerM2]
		] as const) {
			expect(series?.first).toHaveLength(30);
			const sum = (series?.first ?? []).reduce((all, one) => all + one, 0) + Number(series?.rest);
			expect(Math.abs(sum / total - 1)).toBeLessThan(1e-13);
			expect(series?.first[0]).toBe(Number(parts?.zeroTe) + Number(parts?.zeroTm));
		}
	});

	it('leave nothing to the rest where all terms are among the first', () => {
		const { terms, pressurePa } = termsOf(atNm(10_000));
		expect(Math.abs(Number(terms?.pressurePa?.rest))).toBeLessThanOrEqual(
			Number(terms?.pressurePa?.errorBound)
		);
		expect(Number(terms?.pressurePa?.errorBound)).toBeLessThan(1e-10 * Math.abs(pressurePa));
	});

	it('state the thermal share against T = 0', () => {
		const warm = termsOf(atNm(2000));
		const cold = evaluate(atNm(2000, metal, vacuum, metal, 0)).points[0];
		const share = warm.terms?.thermalShare.pressure;
		expect(share?.value).toBeCloseTo((warm.pressurePa - cold.pressurePa) / warm.pressurePa, 9);
		expect(Number(share?.errorBound)).toBeLessThan(1e-8);
		const still = termsOf(atNm(2000, metal, vacuum, metal, 0)).terms;
		expect(still).toEqual({
			thermalShare: { freeEnergy: { value: 0, errorBound: 0 }, pressure: { value: 0, errorBound: 0 } }
		});
	});
});
