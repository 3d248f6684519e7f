import { describe, expect, it } from 'vitest';
import {
	evaluate,
	permittivityOnImaginaryAxis,
	type ForceRequest,
	type MaterialModel,
	type PermittivityModel,
	type Sensitivity
} from '$lib/engine/index.ts';
import { between, bromobenzene, metal, silica, vacuum, water } from '../support/analysis-arrangements.ts';
import { slowForces } from '../support/slow-lifshitz.ts';

/**
 * Derivatives of uniaxial places, of sheets and of undamped carriers against differences of the slow evaluator, which shares
 * no code with them: a probe of both signs and two sizes, the error of second order taken out.
 */

const ask = (request: ForceRequest): Sensitivity => {
	const [{ sensitivity }] = evaluate({ ...request, include: ['sensitivity'] }).points;
	if (!sensitivity) throw new Error('no sensitivity in the answer');
	return sensitivity;
};

const PROBE = { strength: 1, frequencyRadPerS: 5e15 };
const probed = (permittivity: PermittivityModel, strength: number): PermittivityModel => ({
	kind: 'sum',
	of: [permittivity, { kind: 'ninhamParsegian', terms: [{ ...PROBE, strength }] }]
});
const probeAt = permittivityOnImaginaryAxis({ kind: 'ninhamParsegian', terms: [PROBE] });

/** The arrangement with the material at a path replaced. */
function changed(
	request: ForceRequest,
	path: string,
	by: (material: MaterialModel) => MaterialModel
): ForceRequest {
	const copy = structuredClone(request);
	const [side, rest] = path.split('.');
	const { arrangement } = copy;
	if (side === 'medium') {
		arrangement.medium = by(arrangement.medium);
		return copy;
	}
	const body = arrangement[side as 'left' | 'right'];
	const layer = /layers\[(\d+)\]/.exec(rest)?.[1];
	if (layer === undefined) body.substrate = by(body.substrate);
	else body.layers[Number(layer)].of = by(body.layers[Number(layer)].of);
	return copy;
}

type Forces = [freeEnergy: number, pressure: number];

/** Derivative of both quantities at step = 0. */
function slope(of: (step: number) => ForceRequest, size: number): Forces {
	const at = (step: number): Forces => {
		const request = of(step);
		const [nm] = request.separationsNm as number[];
		const { freeEnergyJPerM2, pressurePa } = slowForces(request.arrangement, nm);
		return [freeEnergyJPerM2, pressurePa];
	};
	const central = (step: number): Forces => {
		const [above, below] = [at(step), at(-step)];
		return [(above[0] - below[0]) / (2 * step), (above[1] - below[1]) / (2 * step)];
	};
	const [wide, narrow] = [central(size), central(size / 2)];
	return [(4 * narrow[0] - wide[0]) / 3, (4 * narrow[1] - wide[1]) / 3];
}

const crystal: MaterialModel = {
	permittivity: {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: 6.3, frequencyRadPerS: 1.4e14 },
			{ strength: 2.07, frequencyRadPerS: 1.9e16 }
		]
	},
	normal: {
		permittivity: {
			kind: 'ninhamParsegian',
			terms: [
				{ strength: 8.5, frequencyRadPerS: 9e13 },
				{ strength: 2.02, frequencyRadPerS: 2e16 }
			]
		}
	}
};
const covered = (material: MaterialModel): MaterialModel => ({
	...material,
	sheet: { kind: 'drude', siemens: 4e-4, dampingEv: 0.2 }
});
const layeredMetal: MaterialModel = { ...metal, normal: { permittivity: silica.permittivity } };

const half = (left: MaterialModel, medium: MaterialModel, right: MaterialModel, temperatureK: number) =>
	between(left, medium, right, { separationsNm: [20], temperatureK, relativeAccuracy: 1e-11 });
const coated = (temperatureK: number, over: Partial<ForceRequest['arrangement']> = {}) => {
	const request = between(crystal, water, silica, {
		separationsNm: [12],
		temperatureK,
		relativeAccuracy: 1e-11,
		...over
	});
	request.arrangement.left.layers = [
		{ of: covered(bromobenzene), thicknessNm: 4 },
		{ of: covered(crystal), thicknessNm: 7 }
	];
	request.arrangement.right.layers = [{ of: layeredMetal, thicknessNm: 5 }];
	return request;
};
const ARRANGEMENTS: [string, ForceRequest][] = [
	['uniaxial half-spaces at T = 0', half(crystal, vacuum, silica, 0)],
	['uniaxial half-spaces across a liquid', half(crystal, bromobenzene, crystal, 300)],
	[
		'a sheet on a magnet',
		half(covered({ ...silica, permeability: { kind: 'constant', value: 1.5 } }), vacuum, crystal, 300)
	],
	['coated bodies in water', coated(300)],
	['coated bodies in salt water', coated(300, { debyeLengthNm: 4 })],
	['coated bodies at T = 0', coated(0)]
];

describe.each(ARRANGEMENTS)('derivatives of %s', (_, request) => {
	const { xiRadPerS, weight, places } = ask(request);

	it.each(places.map(({ place }) => place))('to the permittivity at %s', (path) => {
		const derivative = places.find(({ place }) => place === path);
		const predicted = (row: readonly number[] = [], still = 0) =>
			xiRadPerS.reduce((sum, xi, i) => sum + weight[i] * row[i] * (probeAt(xi) - 1), 0) + still;
		const along = path.endsWith('.normal');
		const found = slope(
			(step) =>
				changed(request, path.replace('.normal', ''), (material) =>
					along && material.normal
						? { ...material, normal: { permittivity: probed(material.normal.permittivity, step) } }
						: { ...material, permittivity: probed(material.permittivity, step) }
				),
			2e-3
		);
		expect(
			predicted(derivative?.freeEnergyJPerM2, derivative?.static?.freeEnergyJPerM2) / found[0]
		).toBeCloseTo(1, 6);
		expect(predicted(derivative?.pressurePa, derivative?.static?.pressurePa) / found[1]).toBeCloseTo(1, 6);
	});

	it('to the conductivity of each sheet', () => {
		const sheets = places.filter(({ sheet }) => sheet !== undefined);
		expect(sheets).toHaveLength(JSON.stringify(request).split('"sheet"').length - 1);
		const [{ freeEnergyJPerM2, pressurePa }] = evaluate(request).points;
		for (const { place, sheet } of sheets) {
			const found = slope(
				(step) =>
					changed(request, place, (material) =>
						material.sheet
							? { ...material, sheet: { ...material.sheet, siemens: material.sheet.siemens * (1 + step) } }
							: material
					),
				4e-3
			);
			expect(Number(sheet?.freeEnergy?.value) / (found[0] / freeEnergyJPerM2)).toBeCloseTo(1, 6);
			expect(Number(sheet?.pressure?.value) / (found[1] / pressurePa)).toBeCloseTo(1, 6);
		}
	});
});

describe('a place that is uniaxial in name only', () => {
	const isotropic = half(silica, vacuum, silica, 300);
	const named = half(
		{ ...silica, normal: { permittivity: structuredClone(silica.permittivity) } },
		vacuum,
		silica,
		300
	);
	const parted = half(
		{ ...silica, normal: { permittivity: { kind: 'sum', of: [silica.permittivity] } } },
		vacuum,
		silica,
		300
	);

	it('has the derivatives of the isotropic one', () => {
		const [plain, same] = [isotropic, named].map(ask);
		expect(same.places.map(({ place }) => place)).toEqual(plain.places.map(({ place }) => place));
		same.places[0].pressurePa.forEach((value, i) =>
			expect(Math.abs(value / plain.places[0].pressurePa[i] - 1)).toBeLessThan(1e-10)
		);
	});

	it('has two that add up to them where both are stated apart', () => {
		const [plain, apart] = [isotropic, parted].map(ask);
		const normal = apart.places.find(({ place }) => place === 'left.substrate.normal');
		apart.places[0].pressurePa.forEach((value, i) =>
			expect(
				Math.abs((value + Number(normal?.pressurePa[i])) / plain.places[0].pressurePa[i] - 1)
			).toBeLessThan(1e-10)
		);
		const still = [plain.places[0], apart.places[0], normal].map((one) => Number(one?.static?.pressurePa));
		expect(Math.abs((still[1] + still[2]) / still[0] - 1)).toBeLessThan(1e-10);
	});
});

describe('terms of dressed bodies', () => {
	it('add up to the total', () => {
		const [{ terms, pressurePa }] = evaluate({ ...coated(300), include: ['terms'] }).points;
		const first = terms?.pressurePa?.first ?? [];
		const sum = first.reduce((all, one) => all + one, 0) + Number(terms?.pressurePa?.rest);
		expect(Math.abs(sum / pressurePa - 1)).toBeLessThan(1e-13);
	});

	it('are all there is at large separations', () => {
		const far = { ...half(covered(crystal), vacuum, crystal, 300), separationsNm: [8000] };
		const [{ terms }] = evaluate({ ...far, include: ['terms'] }).points;
		expect(Math.abs(Number(terms?.pressurePa?.rest))).toBeLessThanOrEqual(
			Number(terms?.pressurePa?.errorBound)
		);
	});
});

describe('carriers without damping', () => {
	const plasma: MaterialModel = {
		permittivity: { kind: 'plasma', plasmaEnergyEv: 9 },
		zeroFrequency: 'plasma'
	};

	/** d ln|P|/d ln wp of both plates at 300 K, worked out in extended precision independent of the engine. */
	it.each([
		[100, 0.5647863726135945],
		[1000, 0.1071067617851678]
	])('move the static TE term with their plasma frequency: plates at %i nm', (nm, expected) => {
		const { places } = ask({ ...half(plasma, vacuum, plasma, 300), separationsNm: [nm] });
		const sum = places
			.slice(0, 2)
			.reduce((total, { elasticity }) => total + 2 * Number(elasticity.pressure?.value), 0);
		expect(Math.abs(sum / expected - 1)).toBeLessThan(1e-8);
	});

	it('behind coatings, and where the rule takes the damping from a metal', () => {
		const request = half({ ...metal, zeroFrequency: 'plasma' }, vacuum, silica, 300);
		request.arrangement.left.layers = [
			{ of: silica, thicknessNm: 6 },
			{ of: { ...plasma, permeability: { kind: 'staticOnly', value: 3 } }, thicknessNm: 9 }
		];
		request.arrangement.right.substrate = { permittivity: { kind: 'idealConductor' } };
		request.separationsNm = [400];
		const { places } = ask(request);
		const [{ pressurePa }] = evaluate(request).points;
		const scaled = (path: string) =>
			slope(
				(step) =>
					changed(request, path, (material) => {
						const { permittivity } = material;
						if (permittivity.kind !== 'plasma' && permittivity.kind !== 'drude')
							throw new Error('no carriers');
						const plasmaEnergyEv = permittivity.plasmaEnergyEv * (1 + step);
						return { ...material, permittivity: { ...permittivity, plasmaEnergyEv } };
					}),
				4e-3
			)[1] / pressurePa;
		for (const path of ['left.layers[1].of', 'left.substrate']) {
			const { elasticity } = places.find(({ place }) => place === path) ?? places[0];
			expect((2 * Number(elasticity.pressure?.value)) / scaled(path)).toBeCloseTo(1, 6);
		}
	});

	it('are part of an uncertainty of the plasma energy', () => {
		const uncertain = (uncertainty: MaterialModel['uncertainty']) =>
			evaluate({
				...half({ ...plasma, uncertainty }, vacuum, { ...plasma, uncertainty }, 300),
				separationsNm: [1000],
				include: ['uncertainty']
			}).points[0];
		const { uncertainty, pressurePa } = uncertain({
			kind: 'parameters',
			names: ['plasmaEnergyEv'],
			covariance: [[0.0081]]
		});
		expect(
			Number(uncertainty?.pressurePa.value) / Math.abs(0.01 * 0.1071067617851678 * pressurePa)
		).toBeCloseTo(1, 7);
		const scale = uncertain({ kind: 'scale', relative: 0.02 }).uncertainty;
		expect(Number(scale?.pressurePa.value) / Number(uncertainty?.pressurePa.value)).toBeCloseTo(1, 7);
	});
});
