import { describe, expect, it } from 'vitest';
import type { ForceRequest, MaterialModel, PermittivityModel } from './contract.ts';
import { ENGINE_LIMITS } from './limits.ts';
import { prepare } from './prepare.ts';
import { Refusal } from './refusal.ts';
import { separationsOf } from './validate.ts';

const silica: MaterialModel = {
	permittivity: { kind: 'ninhamParsegian', terms: [{ strength: 1.1, frequencyRadPerS: 2e16 }] }
};
const metal: MaterialModel = { permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 } };

function aRequest(
	change: Partial<ForceRequest['arrangement']> = {},
	rest: Partial<ForceRequest> = {}
): ForceRequest {
	return {
		arrangement: {
			left: { layers: [], substrate: metal },
			medium: { permittivity: { kind: 'vacuum' } },
			right: { layers: [], substrate: silica },
			shape: { kind: 'plates' },
			temperatureK: 300,
			...change
		},
		separationsNm: [100],
		relativeAccuracy: 1e-6,
		include: [],
		...rest
	};
}

const withLeft = (permittivity: PermittivityModel, more: Partial<MaterialModel> = {}): ForceRequest =>
	aRequest({ left: { layers: [], substrate: { permittivity, ...more } } });

function pathsRefused(request: ForceRequest): string[] {
	try {
		prepare(request);
	} catch (error) {
		if (error instanceof Refusal) return error.issues.map(({ path }) => path);
		throw error;
	}
	return [];
}

const table = (energiesEv: number[], epsilon2: number[]): PermittivityModel => ({
	kind: 'table',
	energiesEv,
	epsilon2,
	lowEnd: { kind: 'none' },
	highEnd: { kind: 'none' }
});

const substrate = 'arrangement.left.substrate';

describe('a request is refused', () => {
	it.each<[string, ForceRequest, string]>([
		['closer than an atom', aRequest({}, { separationsNm: [0.001] }), 'separationsNm[0]'],
		['without separations', aRequest({}, { separationsNm: [] }), 'separationsNm'],
		[
			'with a million separations',
			aRequest({}, { separationsNm: { from: 1, to: 10, count: 1e6, spacing: 'log' } }),
			'separationsNm.count'
		],
		[
			'with a range that runs backwards',
			aRequest({}, { separationsNm: { from: 10, to: 1, count: 5, spacing: 'log' } }),
			'separationsNm.to'
		],
		['with a separation that is no number', aRequest({}, { separationsNm: [NaN] }), 'separationsNm[0]'],
		[
			'with ten thousand layers',
			aRequest({ left: { layers: Array(10_000).fill({ of: silica, thicknessNm: 1 }), substrate: silica } }),
			'arrangement.left.layers'
		],
		[
			'with a layer of no thickness',
			aRequest({ right: { layers: [{ of: silica, thicknessNm: 0 }], substrate: silica } }),
			'arrangement.right.layers[0].thicknessNm'
		],
		['below absolute zero', aRequest({ temperatureK: -1 }), 'arrangement.temperatureK'],
		['between zero and the lowest temperature', aRequest({ temperatureK: 0.1 }), 'arrangement.temperatureK'],
		['finer than double precision', aRequest({}, { relativeAccuracy: 1e-14 }), 'relativeAccuracy'],
		[
			'with negative damping',
			withLeft({ kind: 'drude', plasmaEnergyEv: 9, dampingEv: -0.1 }),
			`${substrate}.permittivity.dampingEv`
		],
		['with eps below one', withLeft({ kind: 'constant', value: 0.5 }), `${substrate}.permittivity.value`],
		[
			'with a table that descends',
			withLeft(table([2, 1], [1, 1])),
			`${substrate}.permittivity.energiesEv[1]`
		],
		["with eps'' below zero", withLeft(table([1, 2], [1, -1])), `${substrate}.permittivity.epsilon2[1]`],
		[
			'with columns of different length',
			withLeft(table([1, 2, 3], [1, 1])),
			`${substrate}.permittivity.energiesEv`
		],
		[
			'with eps(i xi) that rises',
			withLeft({ kind: 'imaginaryTable', frequenciesRadPerS: [1e14, 1e15], epsilon: [2, 3] }),
			`${substrate}.permittivity.epsilon[1]`
		],
		['with a sum of nothing', withLeft({ kind: 'sum', of: [] }), `${substrate}.permittivity.of`],
		[
			'with an ideal conductor inside a sum',
			withLeft({ kind: 'sum', of: [{ kind: 'idealConductor' }] }),
			`${substrate}.permittivity.of[0]`
		],
		[
			'with a rule for n = 0 on an insulator',
			withLeft({ kind: 'constant', value: 4 }, { zeroFrequency: 'drude' }),
			`${substrate}.zeroFrequency`
		],
		[
			'with a plasma rule on a bare conductivity',
			withLeft({ kind: 'dcConductivity', siemensPerM: 1 }, { zeroFrequency: 'plasma' }),
			`${substrate}.zeroFrequency`
		],
		[
			'with a negative permeability',
			withLeft(metal.permittivity, { permeability: { kind: 'constant', value: -1 } }),
			`${substrate}.permeability.value`
		],
		[
			'with an ideal conductor in the gap',
			aRequest({ medium: { permittivity: { kind: 'idealConductor' } } }),
			'arrangement.medium.permittivity'
		],
		[
			'with a conducting medium and no word on it',
			aRequest({ medium: metal }),
			'arrangement.medium.zeroFrequency'
		],
		[
			'with an ideally conducting medium',
			aRequest({ medium: { ...metal, zeroFrequency: 'ideal' } }),
			'arrangement.medium.zeroFrequency'
		],
		['with ions at T = 0', aRequest({ temperatureK: 0, debyeLengthNm: 10 }), 'arrangement.debyeLengthNm'],
		[
			'with a sphere of no radius',
			aRequest({ shape: { kind: 'spherePlate', radiusUm: 0 } }),
			'arrangement.shape.radiusUm'
		]
	])('%s', (_, request, path) => {
		expect(pathsRefused(request)).toEqual([path]);
	});

	it('with every problem named, not the first only', () => {
		const left = {
			layers: [{ of: silica, thicknessNm: -1 }],
			substrate: { permittivity: table([1, 2], [-1, -2]) }
		};
		expect(pathsRefused(aRequest({ temperatureK: NaN, left }, { relativeAccuracy: 2 }))).toEqual([
			'relativeAccuracy',
			'arrangement.left.layers[0].thicknessNm',
			`${substrate}.permittivity.epsilon2[0]`,
			`${substrate}.permittivity.epsilon2[1]`,
			'arrangement.temperatureK'
		]);
	});

	it('with the limit in the message', () => {
		expect(() => prepare(aRequest({}, { separationsNm: [1e9] }))).toThrow(
			String(ENGINE_LIMITS.separationNm.max)
		);
	});
});

describe('a request is accepted', () => {
	it.each<[string, ForceRequest]>([
		['at both ends of the separations', aRequest({}, { separationsNm: [0.1, 1e6] })],
		['with a conducting medium and its rule', aRequest({ medium: { ...metal, zeroFrequency: 'drude' } })],
		['with a conducting medium and its Debye length', aRequest({ medium: metal, debyeLengthNm: 10 })],
		[
			'with a conducting medium at T = 0, where there is no n = 0 term',
			aRequest({ medium: metal, temperatureK: 0 })
		]
	])('%s', (_, request) => {
		expect(pathsRefused(request)).toEqual([]);
	});
});

describe('separationsOf', () => {
	it('ends exactly where it is told to', () => {
		const separations = separationsOf({ from: 0.3, to: 7.1, count: 6, spacing: 'log' });
		expect([separations[0], separations[5], separations.length]).toEqual([0.3, 7.1, 6]);
		expect(separations[1] / separations[0]).toBeCloseTo(separations[5] / separations[4], 12);
	});

	it('spreads evenly if asked to', () => {
		expect(separationsOf({ from: 1, to: 3, count: 3, spacing: 'linear' })).toEqual([1, 2, 3]);
	});
});
