import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
	evaluate,
	type ForcePoint,
	type ForceRequest,
	type MaterialModel
} from '../../src/lib/engine/index.ts';

/** Relations that hold whatever the materials (methods sheet, "sanity relations"); seeds are printed by fast-check. */

const vacuum: MaterialModel = { permittivity: { kind: 'vacuum' } };
const drude: MaterialModel = { permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 } };
const plasma: MaterialModel = { permittivity: { kind: 'plasma', plasmaEnergyEv: 9 } };
const ideal: MaterialModel = { permittivity: { kind: 'idealConductor' } };

const oscillators = (c1: number, w1: number, c2: number, w2: number): MaterialModel => ({
	permittivity: {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: c1, frequencyRadPerS: w1 },
			{ strength: c2, frequencyRadPerS: w2 }
		]
	}
});
const silica = oscillators(1.71, 1.88e14, 1.098, 2.033e16);
const liquid = oscillators(0.85, 4e14, 0.755, 1.899e16);

interface Case {
	left: MaterialModel;
	medium: MaterialModel;
	right: MaterialModel;
	leftLayers?: { of: MaterialModel; thicknessNm: number }[];
	temperatureK?: number;
}

function points(one: Case, separationsNm: number[], relativeAccuracy = 1e-11): ForcePoint[] {
	const request: ForceRequest = {
		arrangement: {
			left: { layers: one.leftLayers ?? [], substrate: one.left },
			medium: one.medium,
			right: { layers: [], substrate: one.right },
			shape: { kind: 'plates' },
			temperatureK: one.temperatureK ?? 300
		},
		separationsNm,
		relativeAccuracy,
		include: ['breakdown']
	};
	return evaluate(request).points;
}

const off = (value: number, other: number) => Math.abs(value / other - 1);

const material = fc
	.record({
		c1: fc.double({ min: 0.1, max: 5, noNaN: true }),
		w1: fc.double({ min: 13.5, max: 15, noNaN: true }),
		c2: fc.double({ min: 0.2, max: 4, noNaN: true }),
		w2: fc.double({ min: 15.6, max: 16.6, noNaN: true })
	})
	.map(({ c1, w1, c2, w2 }) => oscillators(c1, 10 ** w1, c2, 10 ** w2));
const separation = fc.double({ min: 0, max: 4, noNaN: true }).map((power) => 10 ** power);

describe('derivatives', () => {
	// Central differences of fourth order; at step 1e-3 their own error is a few 1e-12 of the value, rounding 1e-12.
	const five = (values: number[], step: number) =>
		(values[0] - 8 * values[1] + 8 * values[3] - values[4]) / (12 * step);

	it.each([
		['Drude metals', { left: drude, medium: vacuum, right: drude }],
		['plasma metals', { left: plasma, medium: vacuum, right: plasma }],
		['silica across a liquid', { left: silica, medium: liquid, right: silica }],
		[
			'a coated body at T = 0',
			{
				left: silica,
				medium: vacuum,
				right: drude,
				leftLayers: [{ of: drude, thicknessNm: 5 }],
				temperatureK: 0
			}
		]
	])('P is -dF/dd and G is dP/dd: %s', (_, one: Case) => {
		const d = 100;
		const step = 0.1;
		const around = points(
			one,
			[-2, -1, 0, 1, 2].map((k) => d + k * step)
		);
		const metres = step * 1e-9;
		const { pressurePa, pressureGradientPaPerM } = around[2];
		expect(
			off(
				-five(
					around.map((p) => p.freeEnergyJPerM2),
					metres
				),
				pressurePa
			)
		).toBeLessThan(1e-9);
		expect(
			off(
				five(
					around.map((p) => p.pressurePa),
					metres
				),
				pressureGradientPaPerM
			)
		).toBeLessThan(1e-9);
	});
});

describe('symmetry', () => {
	it('does not change when the bodies are exchanged', () => {
		fc.assert(
			fc.property(material, material, material, separation, (a, b, medium, d) => {
				const [one] = points({ left: a, medium, right: b }, [d], 1e-9);
				const [other] = points({ left: b, medium, right: a }, [d], 1e-9);
				const allowed = one.errorBound.pressure + other.errorBound.pressure;
				expect(off(one.pressurePa, other.pressurePa)).toBeLessThanOrEqual(allowed);
			}),
			{ numRuns: 60 }
		);
	});

	it('is nothing where body and medium are the same', () => {
		const [point] = points({ left: liquid, medium: liquid, right: silica }, [10]);
		expect(point.pressurePa).toBe(0);
		expect(point.freeEnergyJPerM2).toBe(0);
		expect(point.errorBound.pressure).toBe(0);
		expect(point.met).toBe(true);
	});
});

describe('sign', () => {
	it('attracts between like bodies through any medium', () => {
		fc.assert(
			fc.property(material, material, separation, (body, medium, d) => {
				const [point] = points({ left: body, medium, right: body }, [d], 1e-6);
				expect(point.pressurePa).toBeLessThan(0);
				expect(point.pressureGradientPaPerM).toBeGreaterThan(0);
			}),
			{ numRuns: 60 }
		);
	});

	it('repels in both polarizations where the medium lies between the bodies at every frequency', () => {
		const low = oscillators(0.5, 3e14, 0.5, 1.5e16);
		const middle = oscillators(1, 3e14, 1, 1.5e16);
		const high = oscillators(2, 3e14, 2, 1.5e16);
		for (const point of points({ left: low, medium: middle, right: high }, [1, 10, 100, 1000])) {
			const parts = point.breakdown?.pressurePa;
			expect(parts?.te).toBeGreaterThan(0);
			expect(parts?.tm).toBeGreaterThan(0);
			expect(parts?.zeroTm).toBeGreaterThan(0);
		}
	});
});

describe('layers', () => {
	it('of the substrate change nothing', () => {
		const bulk = points({ left: drude, medium: vacuum, right: silica }, [10, 100, 1000]);
		const coated = points(
			{
				left: drude,
				medium: vacuum,
				right: silica,
				leftLayers: [
					{ of: drude, thicknessNm: 20 },
					{ of: drude, thicknessNm: 3 }
				]
			},
			[10, 100, 1000]
		);
		bulk.forEach((point, i) => {
			const allowed = point.errorBound.pressure + coated[i].errorBound.pressure + 1e-13;
			expect(off(coated[i].pressurePa, point.pressurePa)).toBeLessThan(allowed);
		});
	});

	it('go over into the bulk of the layer as they thicken, and of the substrate as they thin', () => {
		const at = (thicknessNm: number) =>
			points(
				{ left: silica, medium: liquid, right: silica, leftLayers: [{ of: drude, thicknessNm }] },
				[20]
			)[0].freeEnergyJPerM2;
		const [asLayer] = points({ left: drude, medium: liquid, right: silica }, [20]);
		expect(off(at(1e5), asLayer.freeEnergyJPerM2)).toBeLessThan(1e-9);
		// A dielectric film: a metal keeps its n = 0 term however thin.
		const film = (thicknessNm: number) =>
			points(
				{ left: silica, medium: vacuum, right: silica, leftLayers: [{ of: liquid, thicknessNm }] },
				[100]
			)[0].pressurePa;
		const [bare] = points({ left: silica, medium: vacuum, right: silica }, [100]);
		expect(off(film(0.1), bare.pressurePa)).toBeLessThan(0.003);
		expect(off(film(0.1), bare.pressurePa)).toBeLessThan(off(film(1), bare.pressurePa) / 8);
	});
});

describe('limits', () => {
	const HBAR_C = (6.62607015e-34 / (2 * Math.PI)) * 299792458;
	const KT = 1.380649e-23 * 300;
	const ZETA_3 = 1.2020569031595942;

	it('follows the long-distance series of plasma plates at T = 0', () => {
		// V. B. Bezerra et al., Mod. Phys. Lett. A 15, 2623 (2000), coefficients recalled and confirmed numerically for this project.
		const penetrationNm = (HBAR_C / (9 * 1.602176634e-19)) * 1e9;
		const x = 0.002;
		const [{ pressurePa }] = points({ left: plasma, medium: vacuum, right: plasma, temperatureK: 0 }, [
			penetrationNm / x
		]);
		const d = (penetrationNm / x) * 1e-9;
		const idealPressure = (-(Math.PI ** 2) * HBAR_C) / (240 * d ** 4);
		const pi2 = Math.PI ** 2;
		const series =
			1 -
			(16 / 3) * x +
			24 * x ** 2 -
			(640 / 7) * (1 - pi2 / 210) * x ** 3 +
			(2800 / 9) * (1 - (163 * pi2) / 7350) * x ** 4;
		// The remainder is of fifth order: a few hundred x^5.
		expect(Math.abs(pressurePa / idealPressure - series)).toBeLessThan(1000 * x ** 5);
	});

	it('is the classical term far beyond the thermal length: two modes for ideal plates, one for Drude metals', () => {
		const d = 60e-6;
		const classical = (-KT * ZETA_3) / (4 * Math.PI * d ** 3);
		expect(
			off(points({ left: ideal, medium: vacuum, right: ideal }, [6e4])[0].pressurePa, classical)
		).toBeLessThan(1e-10);
		expect(
			off(points({ left: drude, medium: vacuum, right: drude }, [6e4])[0].pressurePa, classical / 2)
		).toBeLessThan(1e-10);
	});

	it('goes over into the integral over frequency as the temperature falls', () => {
		const cold = points({ left: silica, medium: vacuum, right: silica, temperatureK: 1 }, [100])[0]
			.pressurePa;
		const zero = points({ left: silica, medium: vacuum, right: silica, temperatureK: 0 }, [100])[0]
			.pressurePa;
		expect(off(cold, zero)).toBeLessThan(1e-7);
	});

	it('repels 7/8 as strongly between an ideal conductor and a magnet, up to the root of its permeability', () => {
		// T. H. Boyer, Phys. Rev. A 9, 2078 (1974).
		const idealPressure = (Math.PI ** 2 * HBAR_C) / (240 * 1e-6 ** 4);
		for (const value of [1e4, 1e6]) {
			const magnet: MaterialModel = {
				permittivity: { kind: 'constant', value: 1 },
				permeability: { kind: 'constant', value }
			};
			const [{ pressurePa }] = points(
				{ left: ideal, medium: vacuum, right: magnet, temperatureK: 0 },
				[1000]
			);
			expect(Math.abs(pressurePa / idealPressure - 7 / 8)).toBeLessThan(8 / Math.sqrt(value));
		}
	});
});

describe('the same request', () => {
	it('gives the same bits whatever separations stand beside it', () => {
		const one = { left: drude, medium: liquid, right: silica, leftLayers: [{ of: silica, thicknessNm: 4 }] };
		const together = points(one, [3, 30, 300, 3000], 1e-7);
		const reversed = points(one, [3000, 300, 30, 3], 1e-7).reverse();
		const alone = [3, 30, 300, 3000].map((d) => points(one, [d], 1e-7)[0]);
		expect(reversed).toEqual(together);
		expect(alone).toEqual(together);
	});
});
