import { describe, expect, it } from 'vitest';
import { evaluate, type ForceRequest, type MaterialModel, type Uncertainty } from '$lib/engine/index.ts';
import { between, metal, silica, vacuum } from '../support/analysis-arrangements.ts';

/** What first-order bands leave out, and when the answer says so. */

const constant = (value: number): MaterialModel => ({ permittivity: { kind: 'constant', value } });
const stated = (material: MaterialModel, uncertainty: Uncertainty): MaterialModel => ({
	...material,
	uncertainty
});
const ask = (
	left: MaterialModel,
	medium: MaterialModel,
	right: MaterialModel,
	over: Partial<ForceRequest> = {}
): ForceRequest =>
	between(left, medium, right, {
		separationsNm: [50],
		temperatureK: 300,
		relativeAccuracy: 1e-9,
		include: ['uncertainty'],
		...over
	});
const uncertaintyOf = (request: ForceRequest) => {
	const [{ uncertainty }] = evaluate(request).points;
	if (!uncertainty?.beyondFirstOrder) throw new Error('no second order in the answer');
	return { ...uncertainty, beyondFirstOrder: uncertainty.beyondFirstOrder };
};
const pressure = (request: ForceRequest) => evaluate({ ...request, include: [] }).points[0].pressurePa;
const codes = (request: ForceRequest) => evaluate(request).warnings.map(({ code }) => code);

/** The larger of |P(+) - P - s| and |P(-) - P + s| over |s|, s the standard uncertainty with the sign of the move. */
function departed([below, own, above]: number[], deviation: number): number {
	const straight = Math.sign(above - below) * deviation;
	return Math.max(Math.abs(above - own - straight), Math.abs(below - own + straight)) / deviation;
}

function expectDeparture(request: ForceRequest, displaced: number[]): void {
	const { beyondFirstOrder, pressurePa } = uncertaintyOf(request);
	expect(beyondFirstOrder.pressure / departed(displaced, pressurePa.value)).toBeCloseTo(1, 4);
}

describe('the departure from the first order of a stated uncertainty', () => {
	it('of scale is that of results with the permittivity displaced', () => {
		const request = ask(stated(constant(3), { kind: 'scale', relative: 0.02 }), vacuum, constant(5));
		const displaced = [-0.02, 0, 0.02].map((by) =>
			pressure(ask(constant(1 + 2 * (1 + by)), vacuum, constant(5)))
		);
		expectDeparture(request, displaced);
	});

	it('moves both plates of one material together', () => {
		const one = stated(constant(3), { kind: 'scale', relative: 0.02 });
		const displaced = [-0.02, 0, 0.02].map((by) => {
			const moved = constant(1 + 2 * (1 + by));
			return pressure(ask(moved, vacuum, moved));
		});
		expectDeparture(ask(one, vacuum, one), displaced);
	});

	it('of parameters is that of results with the parameters displaced', () => {
		const drude = (plasmaEnergyEv: number): MaterialModel => ({
			permittivity: { kind: 'drude', plasmaEnergyEv, dampingEv: 0.035 }
		});
		const uncertain = stated(drude(9), {
			kind: 'parameters',
			names: ['plasmaEnergyEv'],
			covariance: [[0.25]]
		});
		const displaced = [8.5, 9, 9.5].map((wp) => pressure(ask(drude(wp), vacuum, silica)));
		expectDeparture(ask(uncertain, vacuum, silica), displaced);
	});

	it('of a table is that of results with its points displaced', () => {
		const table = (factor: number): MaterialModel => ({
			permittivity: {
				kind: 'table',
				energiesEv: [0.5, 1, 3, 8, 20],
				epsilon2: [0.4, 0.8, 3, 2, 0.3].map((one, i) => one * (i === 2 ? factor : 1)),
				lowEnd: { kind: 'power', exponent: 1 },
				highEnd: { kind: 'power', exponent: 3 }
			}
		});
		const uncertain = stated(table(1), {
			kind: 'table',
			energiesEv: [0.5, 1, 3, 8, 20],
			relative: [0, 0, 0.2, 0, 0],
			correlation: 'independent'
		});
		const displaced = [0.8, 1, 1.2].map((factor) => pressure(ask(table(factor), vacuum, metal)));
		expectDeparture(ask(uncertain, vacuum, metal), displaced);
	});

	it('does not depend on the accuracy asked for', () => {
		const uncertain = stated(silica, { kind: 'scale', relative: 0.01 });
		const [fine, coarse] = [1e-11, 1e-3].map(
			(relativeAccuracy) =>
				uncertaintyOf(ask(uncertain, vacuum, metal, { relativeAccuracy })).beyondFirstOrder
		);
		expect(Math.abs(fine.pressure - coarse.pressure)).toBeLessThan(1e-5);
	});

	it('is nothing where the data are certain', () => {
		expect(uncertaintyOf(ask(silica, vacuum, metal)).beyondFirstOrder).toEqual({
			freeEnergy: 0,
			pressure: 0
		});
	});
});

describe('the warning of a coarse band', () => {
	const both = (relative: number, medium: MaterialModel) => {
		const one = stated(silica, { kind: 'scale', relative });
		return ask(one, medium, one);
	};

	it('is silent at the usual few per cent', () => {
		expect(uncertaintyOf(both(0.05, vacuum)).beyondFirstOrder.pressure).toBeLessThan(0.2);
		expect(codes(both(0.05, vacuum))).not.toContain('uncertainty-order');
	});

	it('speaks where one standard uncertainty moves the contrast by its own size', () => {
		const medium: MaterialModel = {
			permittivity: {
				kind: 'ninhamParsegian',
				terms: [
					{ strength: 1.8, frequencyRadPerS: 1.88e14 },
					{ strength: 1.0, frequencyRadPerS: 2.033e16 }
				]
			}
		};
		expect(uncertaintyOf(both(0.05, medium)).beyondFirstOrder.pressure).toBeGreaterThan(0.2);
		expect(codes(both(0.05, medium))).toContain('uncertainty-order');
	});

	it('speaks of uncertainties as large as the data, and keeps every figure finite', () => {
		const request = both(3, vacuum);
		const { beyondFirstOrder } = uncertaintyOf(request);
		expect(beyondFirstOrder.pressure).toBeGreaterThan(0.2);
		expect(Number.isFinite(beyondFirstOrder.freeEnergy)).toBe(true);
		expect(codes(request)).toContain('uncertainty-order');
	});
});
