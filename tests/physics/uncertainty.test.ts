import { describe, expect, it } from 'vitest';
import {
	evaluate,
	Refusal,
	type ForceRequest,
	type MaterialModel,
	type PermittivityModel,
	type Uncertainty
} from '../../src/lib/engine/index.ts';
import { between, bromobenzene, metal, silica, vacuum } from '../support/analysis-arrangements.ts';

const TABLE: Extract<PermittivityModel, { kind: 'table' }> = {
	kind: 'table',
	energiesEv: [0.1, 0.3, 1, 3, 10, 30],
	epsilon2: [700, 90, 6, 4, 2, 0.2],
	lowEnd: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
	highEnd: { kind: 'power', exponent: 3 }
};
const table: MaterialModel = { permittivity: TABLE };

const ask = (left: MaterialModel, medium: MaterialModel, right: MaterialModel, nm = 100): ForceRequest =>
	between(left, medium, right, {
		separationsNm: [nm],
		temperatureK: 300,
		relativeAccuracy: 1e-11,
		include: ['uncertainty', 'sensitivity']
	});
const uncertaintyOf = (request: ForceRequest) => {
	const [{ uncertainty }] = evaluate(request).points;
	if (!uncertainty) throw new Error('no uncertainty in the answer');
	return uncertainty;
};
const pressure = (request: ForceRequest) => evaluate(request).points[0].pressurePa;
const stated = (material: MaterialModel, uncertainty: Uncertainty): MaterialModel => ({
	...material,
	uncertainty
});

describe('a stated uncertainty', () => {
	it('of scale is the elasticity times as much', () => {
		const request = ask(stated(silica, { kind: 'scale', relative: 0.02 }), vacuum, metal);
		const [{ sensitivity, pressurePa }] = evaluate(request).points;
		const elasticity = Number(sensitivity?.places[0].elasticity.pressure?.value);
		const { pressurePa: found } = uncertaintyOf(request);
		expect(found.value / Math.abs(0.02 * elasticity * pressurePa)).toBeCloseTo(1, 9);
		expect(found.errorBound).toBeLessThan(1e-6);
	});

	it('moves all places of one material together, and different ones apart', () => {
		const scale = { kind: 'scale', relative: 0.01 } as const;
		const both = uncertaintyOf(ask(stated(silica, scale), vacuum, stated(silica, scale)));
		const one = uncertaintyOf(ask(stated(silica, scale), vacuum, silica));
		expect(both.pressurePa.value / one.pressurePa.value).toBeCloseTo(2, 8);
		expect(both.contributions).toHaveLength(1);
		expect(both.contributions[0].places).toEqual(['left.substrate', 'right.substrate']);

		const apart = uncertaintyOf(ask(stated(silica, scale), vacuum, stated(metal, scale)));
		const squares = apart.contributions.reduce((sum, { pressurePa }) => sum + pressurePa ** 2, 0);
		expect(apart.contributions).toHaveLength(2);
		expect(apart.pressurePa.value).toBeCloseTo(Math.sqrt(squares), 12);
	});

	it('of a parameter follows from the result with that parameter changed', () => {
		const names = ['plasmaEnergyEv', 'dampingEv'];
		const covariance = [
			[0.01, -0.0002],
			[-0.0002, 1e-5]
		];
		const request = ask(stated(metal, { kind: 'parameters', names, covariance }), vacuum, silica);
		const slope = (change: Partial<Record<'plasmaEnergyEv' | 'dampingEv', number>>, step: number) => {
			const at = (factor: number) =>
				pressure(
					ask(
						{
							permittivity: {
								kind: 'drude',
								plasmaEnergyEv: 9 + factor * (change.plasmaEnergyEv ?? 0),
								dampingEv: 0.035 + factor * (change.dampingEv ?? 0)
							}
						},
						vacuum,
						silica
					)
				);
			return (at(1) - at(-1)) / (2 * step);
		};
		const [a, b] = [slope({ plasmaEnergyEv: 0.01 }, 0.01), slope({ dampingEv: 1e-4 }, 1e-4)];
		const expected = Math.sqrt(a * a * 0.01 + 2 * a * b * -0.0002 + b * b * 1e-5);
		expect(uncertaintyOf(request).pressurePa.value / expected).toBeCloseTo(1, 4);
	});

	it('of a table in common is what the table scaled as a whole does', () => {
		const uncertainty: Uncertainty = {
			kind: 'table',
			energiesEv: [1],
			relative: [0.03],
			correlation: 'common'
		};
		const found = uncertaintyOf(ask(stated(table, uncertainty), vacuum, silica)).pressurePa.value;
		const whole = uncertaintyOf(ask(stated(table, { kind: 'scale', relative: 0.03 }), vacuum, silica));
		expect(found / whole.pressurePa.value).toBeCloseTo(1, 6);
	});

	it('of single points follows from tables with one point moved', () => {
		const relative = [0, 0, 0.01, 0, 0.02, 0];
		const uncertainty: Uncertainty = {
			kind: 'table',
			energiesEv: TABLE.energiesEv,
			relative,
			correlation: 'independent'
		};
		const moved = (i: number, sign: number): MaterialModel => ({
			permittivity: {
				...TABLE,
				epsilon2: TABLE.epsilon2.map((value, j) => (i === j ? value * (1 + sign * relative[i]) : value))
			}
		});
		const changes = [2, 4].map(
			(i) => (pressure(ask(moved(i, 1), vacuum, silica)) - pressure(ask(moved(i, -1), vacuum, silica))) / 2
		);
		const expected = Math.hypot(...changes);
		// In log-log a moved point bends its neighbours like a power: a hat in ln omega is that to first order.
		expect(
			uncertaintyOf(ask(stated(table, uncertainty), vacuum, silica)).pressurePa.value / expected
		).toBeCloseTo(1, 3);
	});

	it.each<[path: string, material: MaterialModel]>([
		['arrangement.left.substrate.uncertainty.relative', stated(silica, { kind: 'scale', relative: -0.1 })],
		[
			'arrangement.left.substrate.uncertainty.kind',
			stated(silica, { kind: 'table', energiesEv: [1], relative: [0.1], correlation: 'common' })
		],
		[
			'arrangement.left.substrate.uncertainty.names[0]',
			stated(metal, { kind: 'parameters', names: ['terms[3].dampingEv'], covariance: [[1]] })
		],
		[
			'arrangement.left.substrate.uncertainty.covariance',
			stated(metal, {
				kind: 'parameters',
				names: ['plasmaEnergyEv', 'dampingEv'],
				covariance: [
					[1, 2],
					[2, 1]
				]
			})
		],
		[
			'arrangement.left.substrate.uncertainty.energiesEv',
			stated(table, { kind: 'table', energiesEv: [2, 1], relative: [0.1, 0.1], correlation: 'common' })
		]
	])('is refused at %s', (path, material) => {
		expect(issuesOf(ask(material, vacuum, silica))).toContain(path);
	});
});

function issuesOf(request: ForceRequest): string[] {
	try {
		evaluate(request);
	} catch (error) {
		if (error instanceof Refusal) return error.issues.map(({ path }) => path);
		throw error;
	}
	return [];
}

describe('a spread over rivals', () => {
	const other: MaterialModel = {
		permittivity: { kind: 'ninhamParsegian', terms: [{ strength: 1.2, frequencyRadPerS: 1.4e16 }] }
	};

	it('is the envelope of the arrangement and each of them, computed in full', () => {
		const request = ask(metal, bromobenzene, silica, 30);
		request.rivals = [
			{ places: ['medium'], of: other },
			{ places: ['left.substrate', 'right.substrate'], of: table }
		];
		const [{ spread, pressurePa, freeEnergyJPerM2 }] = evaluate(request).points;
		const alone = [ask(metal, other, silica, 30), ask(table, bromobenzene, table, 30)].map(pressure);
		expect(spread?.rivals.map((rival) => rival.pressurePa)).toEqual(alone);
		expect(spread?.pressurePa.low).toBe(Math.min(pressurePa, ...alone));
		expect(spread?.pressurePa.high).toBe(Math.max(pressurePa, ...alone));
		expect(spread?.freeEnergyJPerM2.low).toBeLessThanOrEqual(freeEnergyJPerM2);
		expect(spread?.pressurePa.errorBound).toBeLessThan(1e-10);
	});

	it('stands apart from the numerical bound', () => {
		const request = ask(metal, bromobenzene, silica, 30);
		const [own] = evaluate(request).points;
		const [beside] = evaluate({ ...request, rivals: [{ places: ['medium'], of: other }] }).points;
		expect(beside.errorBound).toEqual(own.errorBound);
		expect(beside.pressurePa).toBe(own.pressurePa);
	});

	it('is refused at a place that the arrangement does not have', () => {
		const request = ask(metal, bromobenzene, silica);
		request.rivals = [{ places: ['left.layers[0].of'], of: other }];
		expect(issuesOf(request)).toContain('rivals[0].places[0]');
	});
});
