import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { estimateCost } from './cost.ts';
import type { ForceRequest, MaterialModel, Shape } from './contract.ts';
import { evaluate, prepare } from './prepare.ts';

const metal: MaterialModel = {
	permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
	zeroFrequency: 'drude'
};
const silica: MaterialModel = {
	permittivity: {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: 1.71, frequencyRadPerS: 1.88e14 },
			{ strength: 1.098, frequencyRadPerS: 2.033e16 }
		]
	}
};
const bromobenzene: MaterialModel = {
	permittivity: {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: 2.967, frequencyRadPerS: 5.47e14 },
			{ strength: 1.335, frequencyRadPerS: 1.286e16 }
		]
	}
};

function aRequest(
	change: Partial<ForceRequest['arrangement']> = {},
	rest: Partial<ForceRequest> = {}
): ForceRequest {
	return {
		arrangement: {
			left: { layers: [], substrate: metal },
			medium: bromobenzene,
			right: { layers: [], substrate: silica },
			shape: { kind: 'plates' },
			temperatureK: 298,
			...change
		},
		separationsNm: [1, 3, 10, 100, 1000],
		relativeAccuracy: 1e-6,
		include: [],
		...rest
	};
}

describe('a preparation', () => {
	it('gives the same bits in whatever order and company points are asked for', () => {
		const request = aRequest({}, { include: ['breakdown'] });
		const whole = evaluate(request).points;
		const preparation = prepare(request);
		const orders = fc.shuffledSubarray([0, 1, 2, 3, 4], { minLength: 1 });
		fc.assert(
			fc.property(orders, (order) => {
				for (const index of order) expect(preparation.point(index)).toEqual(whole[index]);
			}),
			{ numRuns: 20 }
		);
		const alone = evaluate({ ...request, separationsNm: [10] }).points[0];
		expect(alone).toEqual(whole[2]);
	});

	it('says which point there is not', () => {
		expect(() => prepare(aRequest()).point(5)).toThrow(RangeError);
	});
});

describe('an answer', () => {
	it('survives JSON unchanged, an exact zero included', () => {
		const answer = evaluate(aRequest({ left: { layers: [], substrate: bromobenzene } }));
		expect(JSON.parse(JSON.stringify(answer))).toEqual(answer);
		expect(
			answer.points.map(({ pressurePa, errorBound, met }) => [pressurePa, errorBound.pressure, met])
		).toEqual(Array(5).fill([0, 0, true]));
	});

	it.each([0, 300])('sees bodies through thick coatings that match the medium at %d K', (temperatureK) => {
		const hidden = { layers: [{ of: bromobenzene, thicknessNm: 90 }], substrate: metal };
		const close = evaluate(aRequest({ left: hidden, right: hidden, temperatureK }, { separationsNm: [1] }))
			.points[0];
		const bare = { layers: [], substrate: metal };
		const far = evaluate(aRequest({ left: bare, right: bare, temperatureK }, { separationsNm: [181] }))
			.points[0];
		// The coatings are the medium: the same plates, 180 nm farther apart.
		expect(close.met).toBe(true);
		expect(close.pressurePa / far.pressurePa).toBeCloseTo(1, 6);
	});

	it('has parts that add up to the whole', () => {
		for (const point of evaluate(aRequest({}, { include: ['breakdown'] })).points) {
			const { zeroTe, zeroTm, te, tm } = point.breakdown!.pressurePa;
			const size = [zeroTe, zeroTm, te, tm].reduce((sum, part) => sum + Math.abs(part), 0);
			expect(Math.abs(zeroTe + zeroTm + te + tm - point.pressurePa)).toBeLessThan(4e-16 * size);
		}
	});

	it('finds the equilibrium that its points enclose', () => {
		const coated = { layers: [{ of: silica, thicknessNm: 5 }], substrate: metal };
		const request = aRequest(
			{ left: coated },
			{ separationsNm: { from: 1, to: 200, count: 40, spacing: 'log' } }
		);
		const { equilibria, points } = evaluate(request);
		const changes = points.filter(
			(p, i) => i > 0 && Math.sign(p.pressurePa) !== Math.sign(points[i - 1].pressurePa)
		).length;
		expect(changes).toBeGreaterThan(0);
		expect(equilibria).toHaveLength(changes);
		const there = evaluate({ ...request, separationsNm: [equilibria[0].separationNm] }).points[0];
		const scale = Math.abs(there.pressureGradientPaPerM) * there.separationNm * 1e-9;
		expect(Math.abs(there.pressurePa)).toBeLessThan(1e-6 * scale);
		expect(equilibria[0].stable).toBe(there.pressureGradientPaPerM < 0);
		// So close to zero the terms of both signs cancel, and the answer says so instead of claiming digits.
		expect(there.met).toBe(false);
		expect(there.why).toMatch(/pressure .*opposite sign cancel/);
	});
});

describe('a shape', () => {
	const plates = evaluate(aRequest()).points[3];
	const at = (shape: Shape): ReturnType<typeof evaluate> =>
		evaluate(aRequest({ shape }, { separationsNm: [100] }));

	it.each<[string, Shape, number]>([
		['sphere and plate', { kind: 'spherePlate', radiusUm: 50 }, 50e-6],
		['spheres', { kind: 'spheres', leftRadiusUm: 50, rightRadiusUm: 150 }, 37.5e-6],
		['crossed cylinders', { kind: 'crossedCylinders', leftRadiusUm: 25, rightRadiusUm: 100 }, 50e-6]
	])('of %s multiplies energy and pressure of plates by its radius', (_, shape, radius) => {
		const [point] = at(shape).points;
		expect(point.forceN! / (2 * Math.PI * radius * plates.freeEnergyJPerM2)).toBeCloseTo(1, 13);
		expect(point.forceGradientNPerM! / (-2 * Math.PI * radius * plates.pressurePa)).toBeCloseTo(1, 13);
		expect(point.shapeError).toBeGreaterThan(0);
	});

	it('of parallel cylinders is that of a cylinder and a plate with the effective radius', () => {
		const [pair] = at({ kind: 'parallelCylinders', leftRadiusUm: 60, rightRadiusUm: 30 }).points;
		const [single] = at({ kind: 'cylinderPlate', radiusUm: 20 }).points;
		expect(pair.forceN! / single.forceN!).toBeCloseTo(1, 13);
	});

	it('warns where the gap is no longer small against the radius', () => {
		const codes = (radiusUm: number): string[] =>
			at({ kind: 'spherePlate', radiusUm }).warnings.map(({ code }) => code);
		expect(codes(100)).not.toContain('curvature');
		expect(codes(1)).toContain('curvature');
		expect(
			at({ kind: 'spherePlate', radiusUm: 0.5 }).warnings.find(({ code }) => code === 'curvature')?.text
		).toMatch(/no prediction/);
	});
});

describe('warnings', () => {
	it.each<[string, ForceRequest]>([
		['below-continuum', aRequest({}, { separationsNm: [0.5] })],
		[
			'zero-frequency-default',
			aRequest({ left: { layers: [], substrate: { permittivity: metal.permittivity } } })
		],
		['thin-conductor', aRequest({ left: { layers: [{ of: metal, thicknessNm: 5 }], substrate: silica } })],
		['ionic-screening', aRequest({ debyeLengthNm: 10 })],
		[
			'conducting-medium',
			aRequest({
				medium: {
					permittivity: {
						kind: 'sum',
						of: [silica.permittivity, { kind: 'dcConductivity', siemensPerM: 1e-3 }]
					},
					zeroFrequency: 'drude'
				}
			})
		],
		['constant-permittivity', aRequest({ medium: { permittivity: { kind: 'constant', value: 2 } } })],
		[
			'dc-conductivity',
			aRequest({
				right: {
					layers: [],
					substrate: {
						permittivity: {
							kind: 'sum',
							of: [silica.permittivity, { kind: 'dcConductivity', siemensPerM: 1e-9 }]
						}
					}
				}
			})
		],
		[
			'reliance',
			aRequest({
				left: {
					layers: [],
					substrate: {
						permittivity: {
							kind: 'table',
							energiesEv: [1, 2, 4],
							epsilon2: [3, 2, 1],
							lowEnd: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
							highEnd: { kind: 'power', exponent: 3 }
						},
						zeroFrequency: 'drude'
					}
				}
			})
		]
	])('tell of %s', (code, request) => {
		expect(evaluate(request).warnings.map((warning) => warning.code)).toContain(code);
		expect(evaluate(aRequest()).warnings.map((warning) => warning.code)).not.toContain(code);
	});
});

describe('estimateCost', () => {
	it('grows with separations, layers and accuracy, and computes nothing', () => {
		const cost = (request: ForceRequest): number => estimateCost(request).seconds;
		const many = aRequest({}, { separationsNm: { from: 1, to: 1000, count: 2000, spacing: 'log' } });
		const base = cost({ ...many, separationsNm: { from: 1, to: 1000, count: 200, spacing: 'log' } });
		expect(cost(many) / base).toBeGreaterThan(8);
		const layers = Array.from({ length: 20 }, () => ({ of: silica, thicknessNm: 1 }));
		expect(
			cost({ ...many, arrangement: { ...many.arrangement, left: { layers, substrate: silica } } })
		).toBeGreaterThan(2 * cost(many));
		expect(cost({ ...many, relativeAccuracy: 1e-11 })).toBeGreaterThan(cost(many));
	});

	it('is finite for a request that would be refused', () => {
		const absurd = aRequest(
			{ temperatureK: 1e-9 },
			{ separationsNm: { from: 1e-12, to: 1e30, count: 1e9, spacing: 'log' } }
		);
		expect(Number.isFinite(estimateCost(absurd).seconds)).toBe(true);
	});
});
