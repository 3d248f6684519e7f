import { describe, expect, it } from 'vitest';
import type { ForceRequest, MaterialModel } from '$lib/engine/contract.ts';
import { evaluate, Refusal } from '$lib/engine/index.ts';
import { checkRequest } from '$lib/engine/validate.ts';

/** Uniaxial bodies and conducting sheets (methods.md sections 3 and 4). */

const constant = (value: number) => ({ kind: 'constant' as const, value });
const vacuum: MaterialModel = { permittivity: { kind: 'vacuum' } };

function between(
	left: MaterialModel,
	right: MaterialModel,
	over: Partial<ForceRequest['arrangement']> = {}
): ForceRequest {
	return {
		arrangement: {
			left: { layers: [], substrate: left },
			medium: vacuum,
			right: { layers: [], substrate: right },
			shape: { kind: 'plates' },
			temperatureK: 0,
			...over
		},
		separationsNm: [100],
		relativeAccuracy: 1e-10,
		include: []
	};
}

const off = (value: number, figure: number): number => Math.abs(value / figure - 1);

/** -pi^2 hbar c/(240 d^4) at 100 nm, from the exact SI constants. */
const IDEAL = -(Math.PI ** 2 * (6.62607015e-34 / (2 * Math.PI)) * 299792458) / (240 * 1e-28);

describe('uniaxial plates, axis along the normal', () => {
	const uniaxial: MaterialModel = { permittivity: constant(4), normal: { permittivity: constant(9) } };

	it('press as the closed form integrates to at T = 0', () => {
		// Coefficients of Barash (1978), integrated with 18 digits.
		const [point] = evaluate(between(uniaxial, uniaxial)).points;
		expect(off(point.pressurePa / IDEAL, 0.1630879298447859)).toBeLessThan(1e-10);
		expect(point.errorBound.pressure).toBeLessThan(1e-9);
	});

	it('reflect like the geometric mean at n = 0', () => {
		const arrangement = { temperatureK: 300 };
		const request = { ...between(uniaxial, uniaxial, arrangement), include: ['breakdown' as const] };
		const mean = between({ permittivity: constant(6) }, { permittivity: constant(6) }, arrangement);
		const [a] = evaluate(request).points;
		const [b] = evaluate({ ...mean, include: ['breakdown'] }).points;
		const [one, other] = [a, b].map(({ breakdown }) => breakdown?.pressurePa.zeroTm ?? 0);
		expect(off(one, other)).toBeLessThan(1e-14);
		// Delta = 5/7 of the reference sheet.
		expect((6 - 1) / (6 + 1)).toBeCloseTo(0.7142857142857143, 15);
	});

	it('are isotropic where both permittivities are alike, as substrates and as layers', () => {
		const silica = {
			kind: 'ninhamParsegian' as const,
			terms: [
				{ strength: 1.7, frequencyRadPerS: 1.9e14 },
				{ strength: 1.1, frequencyRadPerS: 2.1e16 }
			]
		};
		const plain = { permittivity: silica };
		const same = { permittivity: silica, normal: { permittivity: silica } };
		const layered = (of: MaterialModel) => ({
			layers: [{ of, thicknessNm: 20 }],
			substrate: { permittivity: constant(4) }
		});
		for (const over of [{}, { temperatureK: 300 }]) {
			const [isotropic] = evaluate(between(plain, plain, { ...over, left: layered(plain) })).points;
			const [dressed] = evaluate(between(same, same, { ...over, left: layered(same) })).points;
			expect(off(dressed.pressurePa, isotropic.pressurePa)).toBeLessThan(1e-12);
			expect(off(dressed.freeEnergyJPerM2, isotropic.freeEnergyJPerM2)).toBeLessThan(1e-12);
		}
	});

	it('have a non-retarded coefficient that short separations tend to', () => {
		const term = (strength: number) => ({
			kind: 'ninhamParsegian' as const,
			terms: [{ strength, frequencyRadPerS: 1.5e16 }]
		});
		const body: MaterialModel = { permittivity: term(2), normal: { permittivity: term(0.8) } };
		const request = between(body, body, { temperatureK: 300 });
		const answer = evaluate({ ...request, separationsNm: [0.1], include: ['analysis'] });
		const limit = answer.nonRetarded?.hamakerJ?.value ?? NaN;
		const found = answer.points[0].analysis?.hamakerFromFreeEnergyJ.value ?? NaN;
		// Retardation takes some 4e-4 at 0.1 nm.
		expect(off(found, limit)).toBeLessThan(1e-3);
	});
});

describe('conducting sheets', () => {
	/** sigma = ratio eps_0 c. */
	const sheet = (ratio: number): MaterialModel => ({
		...vacuum,
		sheet: { kind: 'constant', siemens: ratio * 8.8541878188e-12 * 299792458 }
	});

	it.each([
		[0.02292530920665952, 5.383322866631232e-3],
		[1, 0.1801874930796481]
	])('free-standing, of %f eps_0 c, press as their coefficients integrate to', (ratio, figure) => {
		const [point] = evaluate(between(sheet(ratio), sheet(ratio))).points;
		expect(off(point.pressurePa / IDEAL, figure)).toBeLessThan(1e-10);
	});

	it('vanish as their conductivity does, and become mirrors as it grows', () => {
		const plain = { permittivity: constant(4) };
		const covered = (siemens: number): MaterialModel => ({ ...plain, sheet: { kind: 'constant', siemens } });
		const at = (material: MaterialModel) => evaluate(between(material, plain)).points[0].pressurePa;
		expect(off(at(covered(1e-12)), at(plain))).toBeLessThan(1e-8);
		expect(off(at(covered(1e3)), at({ permittivity: { kind: 'idealConductor' } }))).toBeLessThan(1e-4);
	});

	it('reflect the static TM term wholly', () => {
		const request = between(sheet(0.02), sheet(0.5), { temperatureK: 300 });
		const [point] = evaluate({ ...request, separationsNm: [1000], include: ['breakdown'] }).points;
		// -kB T zeta(3)/(8 pi d^3)
		const metal = (-1.380649e-23 * 300 * 1.2020569031595942) / (8 * Math.PI * 1e-18);
		expect(off(point.breakdown?.pressurePa.zeroTm ?? 0, metal)).toBeLessThan(1e-12);
		expect(point.breakdown?.pressurePa.zeroTe).toBe(0);
		expect(evaluate(request).warnings.map(({ code }) => code)).toContain('conducting-sheet');
	});
});

describe('what is refused', () => {
	const paths = (request: ForceRequest): string[] => {
		try {
			checkRequest(request);
		} catch (error) {
			if (error instanceof Refusal) return error.issues.map(({ path }) => path);
			throw error;
		}
		return [];
	};
	const glass: MaterialModel = { permittivity: constant(4) };

	it('an axis or a sheet in the medium', () => {
		const medium: MaterialModel = {
			...glass,
			normal: { permittivity: constant(3) },
			sheet: { kind: 'constant', siemens: 1e-4 }
		};
		expect(paths(between(glass, glass, { medium }))).toEqual([
			'arrangement.medium.normal',
			'arrangement.medium.sheet'
		]);
	});

	it('a wrong permittivity along the axis, a sheet without conductivity, a sheet on a mirror', () => {
		const left: MaterialModel = { ...glass, normal: { permittivity: constant(0.5) } };
		const right: MaterialModel = {
			permittivity: { kind: 'idealConductor' },
			sheet: { kind: 'drude', siemens: 0, dampingEv: 0.01 }
		};
		expect(paths(between(left, right))).toEqual([
			'arrangement.left.substrate.normal.permittivity.value',
			'arrangement.right.substrate.sheet',
			'arrangement.right.substrate.sheet.siemens'
		]);
	});

	it('a sheet against a medium that conducts without ions', () => {
		const left: MaterialModel = { ...glass, sheet: { kind: 'constant', siemens: 1e-4 } };
		const medium: MaterialModel = {
			permittivity: { kind: 'sum', of: [constant(2), { kind: 'dcConductivity', siemensPerM: 1e-3 }] },
			zeroFrequency: 'drude'
		};
		expect(paths(between(left, glass, { medium, temperatureK: 300 }))).toEqual([
			'arrangement.left.substrate.sheet'
		]);
	});
});
