import type { ForceRequest, MaterialModel, PermittivityModel } from '../../src/lib/engine/contract.ts';

/** Typical work for the bench: 100 separations each, spread over the decades in which such a force is measured. */
export interface BenchCase {
	name: string;
	request: ForceRequest;
}

const vacuum: MaterialModel = { permittivity: { kind: 'vacuum' } };

const goldLike: MaterialModel = {
	zeroFrequency: 'drude',
	permittivity: {
		kind: 'sum',
		of: [
			{ kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
			{
				kind: 'lorentz',
				terms: [3, 4.5, 8, 13, 22].map((energyEv, i) => ({
					strengthEv2: [7, 40, 60, 100, 220][i],
					energyEv,
					dampingEv: energyEv / 4
				}))
			}
		]
	}
};

const silicaLike: MaterialModel = {
	permittivity: {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: 1.71, frequencyRadPerS: 1.88e14 },
			{ strength: 1.098, frequencyRadPerS: 2.033e16 }
		]
	}
};

const liquid: MaterialModel = {
	permittivity: {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: 2.967, frequencyRadPerS: 5.47e14 },
			{ strength: 1.335, frequencyRadPerS: 1.286e16 }
		]
	}
};

const magnetic: MaterialModel = {
	permittivity: { kind: 'drude', plasmaEnergyEv: 4.9, dampingEv: 0.044 },
	zeroFrequency: 'drude',
	permeability: { kind: 'debye', value: 110, relaxationTimePs: 100 }
};

/** A measured-looking table: two broad bands, and a Drude edge where it conducts. */
export function tableOf(rows: number, strength = 1, conducts = true): PermittivityModel {
	const energiesEv = Array.from({ length: rows }, (_, i) => 0.1 * Math.pow(1000, i / (rows - 1)));
	const band = (energy: number, centre: number, width: number, strength: number): number =>
		(strength * width * energy) / ((centre ** 2 - energy ** 2) ** 2 + (width * energy) ** 2);
	return {
		kind: 'table',
		energiesEv,
		epsilon2: energiesEv.map(
			(energy) =>
				(conducts ? (81 * 0.035) / (energy * (energy ** 2 + 0.035 ** 2)) : 0) +
				strength * band(energy, 3.2, 1.5, 30) +
				strength * band(energy, 20, 18, 200)
		),
		lowEnd: conducts
			? { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 }
			: { kind: 'power', exponent: 1 },
		highEnd: { kind: 'power', exponent: 3 }
	};
}

interface Setup {
	left: MaterialModel;
	medium: MaterialModel;
	right: MaterialModel;
	layers?: { of: MaterialModel; thicknessNm: number }[];
	temperatureK?: number;
	relativeAccuracy?: number;
	from?: number;
	to?: number;
	count?: number;
}

const request = (setup: Setup): ForceRequest => ({
	arrangement: {
		left: { layers: setup.layers ?? [], substrate: setup.left },
		medium: setup.medium,
		right: { layers: setup.layers ?? [], substrate: setup.right },
		shape: { kind: 'plates' },
		temperatureK: setup.temperatureK ?? 300
	},
	separationsNm: {
		from: setup.from ?? 10,
		to: setup.to ?? 10_000,
		count: setup.count ?? 100,
		spacing: 'log'
	},
	relativeAccuracy: setup.relativeAccuracy ?? 1e-6,
	include: []
});

const threeLayers = [
	{ of: silicaLike, thicknessNm: 5 },
	{ of: goldLike, thicknessNm: 20 },
	{ of: silicaLike, thicknessNm: 50 }
];

const metals = { left: goldLike, medium: vacuum, right: goldLike };
const metalTable: MaterialModel = { permittivity: tableOf(500), zeroFrequency: 'drude' };

export const BENCH_CASES: BenchCase[] = [
	{ name: 'metals across vacuum, 1e-6', request: request(metals) },
	{ name: 'metals across vacuum, 1e-8', request: request({ ...metals, relativeAccuracy: 1e-8 }) },
	{ name: 'metals across vacuum, 1e-11', request: request({ ...metals, relativeAccuracy: 1e-11 }) },
	{
		name: 'metal, liquid, silica, 1e-6',
		request: request({ left: goldLike, medium: liquid, right: silicaLike, from: 1, to: 1000 })
	},
	{
		name: '3 layers a side, liquid, 1e-8',
		request: request({
			left: silicaLike,
			medium: liquid,
			right: goldLike,
			layers: threeLayers,
			from: 1,
			to: 1000,
			relativeAccuracy: 1e-8
		})
	},
	{
		name: 'table of 500 rows, vacuum, 1e-6',
		request: request({ left: metalTable, medium: vacuum, right: metalTable })
	},
	{ name: 'metals at T = 0, 1e-6', request: request({ ...metals, temperatureK: 0 }) },
	{
		name: 'magnetic metals, vacuum, 1e-6',
		request: request({ left: magnetic, medium: vacuum, right: magnetic })
	}
];

/** How cost grows: the same work with more separations and with more layers. */
export const GROWTH_CASES: BenchCase[] = [
	...[10, 100, 1000].map((count) => ({
		name: `metals, ${count} separations`,
		request: request({ ...metals, count })
	})),
	...[1, 4, 16].map((count) => ({
		name: `${count} layers a side`,
		request: request({
			left: silicaLike,
			medium: liquid,
			right: silicaLike,
			layers: Array.from({ length: count }, (_, i) => ({ of: i % 2 ? silicaLike : goldLike, thicknessNm: 5 }))
		})
	}))
];
