import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ForcePoint, MaterialModel, Shape } from '$lib/engine/contract.ts';
import { evaluate } from '$lib/engine/index.ts';
import { between, vacuum } from '../support/analysis-arrangements.ts';

/** Relations of scale and place that hold for every material, and closed sums that hold at every temperature. */

const HBAR = 6.62607015e-34 / (2 * Math.PI);
const BOLTZMANN = 1.380649e-23;
const SPEED_OF_LIGHT = 299792458;
const off = (value: number, other: number): number => Math.abs(value / other - 1);

/** Oscillators whose every frequency is `scale` times that of the same numbers at scale 1. */
const body = ([c1, w1, c2, w2]: number[], scale = 1): MaterialModel => ({
	permittivity: {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: c1, frequencyRadPerS: scale * 10 ** w1 },
			{ strength: c2, frequencyRadPerS: scale * 10 ** w2 }
		]
	}
});
const numbers = fc.tuple(
	fc.double({ min: 0.1, max: 5, noNaN: true }),
	fc.double({ min: 13.5, max: 15, noNaN: true }),
	fc.double({ min: 0.2, max: 4, noNaN: true }),
	fc.double({ min: 15.6, max: 16.6, noNaN: true })
);
const power = (from: number, to: number) =>
	fc.double({ min: from, max: to, noNaN: true }).map((p) => 10 ** p);

function point(
	left: MaterialModel,
	medium: MaterialModel,
	right: MaterialModel,
	nm: number,
	over: { temperatureK?: number; shape?: Shape; layers?: [MaterialModel, number][] } = {}
): ForcePoint {
	const { layers = [], ...arrangement } = over;
	const request = between(left, medium, right, {
		temperatureK: 300,
		...arrangement,
		separationsNm: [nm],
		relativeAccuracy: 1e-10,
		include: ['breakdown']
	});
	request.arrangement.left.layers = layers.map(([of, thicknessNm]) => ({ of, thicknessNm }));
	return evaluate(request).points[0];
}

/** Two values that are one and the same number apart from their bounds. */
function expectSame(a: ForcePoint, b: ForcePoint, factors: [number, number, number]): void {
	const rows = [
		[a.freeEnergyJPerM2, b.freeEnergyJPerM2 * factors[0], a.errorBound.freeEnergy + b.errorBound.freeEnergy],
		[a.pressurePa, b.pressurePa * factors[1], a.errorBound.pressure + b.errorBound.pressure],
		[
			a.pressureGradientPaPerM,
			b.pressureGradientPaPerM * factors[2],
			a.errorBound.pressureGradient + b.errorBound.pressureGradient
		]
	];
	for (const [one, other, bound] of rows)
		expect(Math.abs(one - other)).toBeLessThanOrEqual((bound + 1e-13) * Math.abs(one));
}

describe('scale', () => {
	it('of frequencies and temperature is that of lengths: F goes with its third power', () => {
		fc.assert(
			fc.property(numbers, numbers, numbers, power(0.3, 3.5), power(-0.5, 0.5), (a, b, c, nm, scale) => {
				const plain = point(body(a), body(b), body(c), nm, { temperatureK: 250 });
				const scaled = point(body(a, scale), body(b, scale), body(c, scale), nm / scale, {
					temperatureK: 250 * scale
				});
				expectSame(scaled, plain, [scale ** 3, scale ** 4, scale ** 5]);
			}),
			{ numRuns: 40 }
		);
	});
});

describe('place', () => {
	it('of an outer layer of the medium is distance', () => {
		fc.assert(
			fc.property(numbers, numbers, numbers, power(0.3, 3), power(0, 2.5), (a, b, c, nm, thickness) => {
				const medium = body(b);
				const behind = point(body(a), medium, body(c), nm, { layers: [[medium, thickness]] });
				expectSame(behind, point(body(a), medium, body(c), nm + thickness), [1, 1, 1]);
			}),
			{ numRuns: 40 }
		);
	});

	it('of a cut through a layer is nothing', () => {
		fc.assert(
			fc.property(numbers, numbers, numbers, power(0.3, 3), power(0, 2), power(0, 2), (a, b, c, nm, t, u) => {
				const film = body(c);
				const whole = point(body(a), vacuum, body(b), nm, { layers: [[film, t + u]] });
				const cut = point(body(a), vacuum, body(b), nm, {
					layers: [
						[film, t],
						[film, u]
					]
				});
				expectSame(cut, whole, [1, 1, 1]);
			}),
			{ numRuns: 40 }
		);
	});
});

describe('contrast', () => {
	it('grows, and the attraction of like bodies with it, term by term', () => {
		fc.assert(
			fc.property(
				numbers,
				numbers,
				power(0.3, 3.5),
				fc.double({ min: 1.01, max: 3, noNaN: true }),
				(a, b, nm, more) => {
					const [c1, w1, c2, w2] = a;
					// A body that is denser than the medium at every frequency, and one denser still.
					const dense = (factor: number): MaterialModel => ({
						permittivity: {
							kind: 'sum',
							of: [body(b).permittivity, body([factor * c1, w1, factor * c2, w2]).permittivity]
						}
					});
					const [less, greater] = [1, more].map((factor) => point(dense(factor), body(b), dense(factor), nm));
					for (const part of ['zeroTm', 'te', 'tm'] as const)
						expect(greater.breakdown?.pressurePa[part]).toBeLessThan(
							Number(less.breakdown?.pressurePa[part])
						);
				}
			),
			{ numRuns: 40 }
		);
	});

	it('of any bodies across vacuum leaves less than ideal conductors have', () => {
		const ideal: MaterialModel = { permittivity: { kind: 'idealConductor' } };
		fc.assert(
			fc.property(numbers, numbers, power(0, 4), (a, b, nm) => {
				const real = point(body(a), vacuum, body(b), nm);
				const limit = point(ideal, vacuum, ideal, nm);
				for (const part of ['zeroTm', 'te', 'tm'] as const)
					expect(Math.abs(Number(real.breakdown?.pressurePa[part]))).toBeLessThan(
						Math.abs(Number(limit.breakdown?.pressurePa[part]))
					);
			}),
			{ numRuns: 40 }
		);
	});
});

describe('ideal conductors at any temperature', () => {
	const ideal: MaterialModel = { permittivity: { kind: 'idealConductor' } };
	const series = (order: number, z: number): number => {
		let sum = 0;
		for (let j = 1, term = z; term > 1e-18; j++, term *= z) sum += term / j ** order;
		return sum;
	};

	it('have the sums of polylogarithms', () => {
		fc.assert(
			fc.property(power(1, 4), power(1.5, 3), (nm, temperatureK) => {
				const d = nm * 1e-9;
				const first = (4 * Math.PI * BOLTZMANN * temperatureK * d) / (HBAR * SPEED_OF_LIGHT);
				const zeta3 = 1.2020569031595942;
				let [energy, pressure] = [zeta3 / 2, zeta3];
				for (let n = 1; n * first < 45; n++) {
					const y = n * first;
					const z = Math.exp(-y);
					const [one, two, three] = [-Math.log1p(-z), series(2, z), series(3, z)];
					energy += y * two + three;
					pressure += y * y * one + 2 * y * two + 2 * three;
				}
				const kT = BOLTZMANN * temperatureK;
				const found = point(ideal, vacuum, ideal, nm, { temperatureK });
				expect(off(found.freeEnergyJPerM2, (-2 * kT * energy) / (8 * Math.PI * d ** 2))).toBeLessThan(1e-10);
				expect(off(found.pressurePa, (-2 * kT * pressure) / (8 * Math.PI * d ** 3))).toBeLessThan(1e-10);
			}),
			{ numRuns: 30 }
		);
	});
});

describe('shapes', () => {
	it('are one another where a radius grows without end', () => {
		const [left, right] = [body([1, 14.3, 1.1, 16.2]), body([3, 14.5, 2, 16.1])];
		const force = (shape: Shape) => point(left, vacuum, right, 80, { shape }).forceN;
		const far = 1e7;
		const sphere = Number(force({ kind: 'spherePlate', radiusUm: 2 }));
		expect(off(Number(force({ kind: 'spheres', leftRadiusUm: 2, rightRadiusUm: far })), sphere)).toBeLessThan(
			3e-7
		);
		expect(
			off(Number(force({ kind: 'crossedCylinders', leftRadiusUm: 2, rightRadiusUm: 2 })), sphere)
		).toBeLessThan(1e-13);
		const cylinder = Number(force({ kind: 'cylinderPlate', radiusUm: 2 }));
		expect(
			off(Number(force({ kind: 'parallelCylinders', leftRadiusUm: far, rightRadiusUm: 2 })), cylinder)
		).toBeLessThan(3e-7);
	});

	it('have a gradient that is the slope of their force', () => {
		const [left, right] = [body([1, 14.3, 1.1, 16.2]), body([3, 14.5, 2, 16.1])];
		const shapes: Shape[] = [
			{ kind: 'spherePlate', radiusUm: 5 },
			{ kind: 'cylinderPlate', radiusUm: 5 }
		];
		for (const shape of shapes) {
			const at = (nm: number) => point(left, vacuum, right, nm, { shape });
			const slope = (h: number) => (Number(at(90 + h).forceN) - Number(at(90 - h).forceN)) / (2e-9 * h);
			const found = (4 * slope(0.5) - slope(1)) / 3;
			expect(off(Number(at(90).forceGradientNPerM), found)).toBeLessThan(1e-6);
		}
	});
});
