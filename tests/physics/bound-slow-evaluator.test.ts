import { describe, expect, it } from 'vitest';
import type { ArrangementOf, BodyOf, MaterialModel, PermittivityModel } from '$lib/engine/contract.ts';
import { randomRequest } from '../support/random-requests.ts';
import { tableSusceptibility } from '../support/slow-lifshitz-table.ts';
import { spreadSusceptibility } from '../support/slow-lifshitz-composed.ts';
import { slowForces } from '../support/slow-lifshitz.ts';

const bulk = (of: MaterialModel): BodyOf<MaterialModel> => ({ layers: [], substrate: of });
const coated = (of: MaterialModel, thicknessNm: number, substrate: MaterialModel): BodyOf<MaterialModel> => ({
	layers: [{ of, thicknessNm }],
	substrate
});

const vacuum: MaterialModel = { permittivity: { kind: 'vacuum' } };
const ideal: MaterialModel = { permittivity: { kind: 'idealConductor' } };
const drude: MaterialModel = {
	permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
	zeroFrequency: 'drude'
};
const mixed: MaterialModel = { ...drude, zeroFrequency: 'plasma' };
const plasma: MaterialModel = {
	permittivity: { kind: 'plasma', plasmaEnergyEv: 9 },
	zeroFrequency: 'plasma'
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
const bromobenzeneLike: MaterialModel = {
	permittivity: {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: 2.967, frequencyRadPerS: 5.47e14 },
			{ strength: 1.335, frequencyRadPerS: 1.286e16 }
		]
	}
};
const polarLiquid: MaterialModel = {
	permittivity: {
		kind: 'sum',
		of: [
			{ kind: 'debye', terms: [{ strength: 74.8, relaxationTimePs: 9.523809523809524 }] },
			{
				kind: 'ninhamParsegian',
				terms: [
					{ strength: 0.85, frequencyRadPerS: 4e14 },
					{ strength: 0.755, frequencyRadPerS: 1.899e16 }
				]
			}
		]
	}
};

function between(
	left: BodyOf<MaterialModel>,
	medium: MaterialModel,
	right: BodyOf<MaterialModel>,
	temperatureK: number
): ArrangementOf<MaterialModel> {
	return { left, medium, right, shape: { kind: 'plates' }, temperatureK };
}

const F = 'freeEnergyJPerM2';
const P = 'pressurePa';
const G = 'pressureGradientPaPerM';

/** Derived check values computed in extended precision; the id names the row in the collection of derived values. */
const derived: [string, ArrangementOf<MaterialModel>, number, typeof F | typeof P | typeof G, number][] = [
	['ideal.P0_1e-7', between(bulk(ideal), vacuum, bulk(ideal), 0), 100, P, -1.300125773244365e1],
	['ideal.F0_1um', between(bulk(ideal), vacuum, bulk(ideal), 0), 1000, F, -4.333752577481218e-10],
	['ideal.G0_1um', between(bulk(ideal), vacuum, bulk(ideal), 0), 1000, G, 5.200503092977462e3],
	['ideal.F300_3e-6', between(bulk(ideal), vacuum, bulk(ideal), 300), 3000, F, -2.359229460080105e-11],
	['au.drude.P300_50nm', between(bulk(drude), vacuum, bulk(drude), 300), 50, P, -5.864562770491143e1],
	['au.drude.F300_100nm', between(bulk(drude), vacuum, bulk(drude), 300), 100, F, -2.206834614771943e-7],
	['au.drude.G300_1000nm', between(bulk(drude), vacuum, bulk(drude), 300), 1000, G, 3.990538298139303e3],
	['au.plasma.G300_100nm', between(bulk(plasma), vacuum, bulk(plasma), 300), 100, G, 1.976066298424951e8],
	['au.plasma.P300_5000nm', between(bulk(plasma), vacuum, bulk(plasma), 300), 5000, P, -3.184943969666824e-6],
	['au.mixed.P300_1e-7', between(bulk(mixed), vacuum, bulk(mixed), 300), 100, P, -5.699692093740753],
	[
		'press.SLS_5e-8',
		between(bulk(silicaLike), polarLiquid, bulk(silicaLike), 298.15),
		50,
		P,
		-1.586921228451127
	],
	[
		'press.ABS_5e-8',
		between(bulk(drude), bromobenzeneLike, bulk(silicaLike), 298.15),
		50,
		P,
		4.249936712350857
	],
	[
		'film.drude_t2_1e-7',
		between(coated(drude, 2, silicaLike), vacuum, coated(drude, 2, silicaLike), 300),
		100,
		P,
		-2.352321166436749
	],
	[
		'film.plasma_t10_1e-6',
		between(coated(plasma, 10, silicaLike), vacuum, coated(plasma, 10, silicaLike), 300),
		1000,
		P,
		-1.0370950585307e-3
	]
];

/** Tables of the derived collection, xi in eV; digits as listed there. */
const energies = [0.5, 1, 2, 4, 8, 16];
const epsilon2 = [20, 5, 2, 4, 1.5, 0.2];
const tables: [number, number][] = [
	[0.1624329, 102.8347056356431],
	[1, 9.33583632660866],
	[10, 1.629013560496308]
];

describe('the slow evaluator', () => {
	it.each(derived)('reproduces %s to 1e-13', (_id, arrangement, separationNm, field, value) => {
		const answer = slowForces(arrangement, separationNm);
		expect(Math.abs(answer[field] / value - 1)).toBeLessThan(1e-13);
	});

	it.each(tables)('transforms a six-point table at %s eV as the derived closed forms do', (xi, value) => {
		const chi = tableSusceptibility(
			energies,
			epsilon2,
			{ kind: 'drude', plasmaEnergyEv: 2, dampingEv: 0.1 },
			{ kind: 'power', exponent: 3 },
			xi
		);
		expect(Math.abs((1 + chi) / value - 1)).toBeLessThan(1e-14);
	});

	it('transforms a table with a zero point', () => {
		const chi = tableSusceptibility([1, 2, 4], [0, 3, 1], { kind: 'none' }, { kind: 'none' }, 1);
		expect(Math.abs(chi / 1.119264170358953 - 1)).toBeLessThan(1e-14);
	});

	it.each([20, 300, 1e4])('keeps the digits of a spread oscillator at %s times its resonance', (ratio) => {
		const term = { strengthEv2: 0.07, energyEv: 0.4, dampingEv: 0.08, widthEv: 0.03 };
		const xi = ratio * term.energyEv;
		const square = xi * (xi + term.dampingEv);
		// moments of the normal distribution: mean of 1/(x^2 + b^2) for b far above x
		const [w, s] = [term.energyEv ** 2 / square, term.widthEv ** 2 / square];
		const series =
			1 -
			(w + s) +
			(w * w + 6 * w * s + 3 * s * s) -
			(w ** 3 + 15 * w * w * s + 45 * w * s * s + 15 * s ** 3);
		const next = 10 * (w + s) ** 4;
		const value = (spreadSusceptibility(term, xi) * square) / term.strengthEv2;
		// a thousand terms of one sign, exponents of which up to 45 are rounded
		expect(Math.abs(value - series)).toBeLessThan(1e-13 + next);
	});

	it('screens the static term as the derived values do', () => {
		// relaxation so slow that nothing but n = 0 is left
		const wall: PermittivityModel = { kind: 'debye', terms: [{ strength: 2.8, relaxationTimePs: 1e30 }] };
		const water: PermittivityModel = { kind: 'debye', terms: [{ strength: 77.4, relaxationTimePs: 1e30 }] };
		const screened = (debyeLengthNm: number) =>
			slowForces(
				{
					...between(
						bulk({ permittivity: wall }),
						{ permittivity: water },
						bulk({ permittivity: wall }),
						298.15
					),
					debyeLengthNm
				},
				5
			).freeEnergyJPerM2;
		expect(Math.abs(screened(9.61370080157468) / -2.159550971624957e-6 - 1)).toBeLessThan(1e-12);
		expect(Math.abs(screened(0.961370080157468) / -1.057191862458828e-9 - 1)).toBeLessThan(1e-12);
	});

	it('gives the same in blocks and term by term, and with more nodes', () => {
		for (const seed of [4, 11, 23]) {
			const { arrangement } = randomRequest(seed);
			const warm = { ...arrangement, temperatureK: 300 };
			const blocks = slowForces(warm, 60);
			const singly = slowForces(warm, 60, { everyTerm: true, nodes: 20 });
			const allowed = 2e-14;
			expect(Math.abs(blocks[F] - singly[F])).toBeLessThanOrEqual(allowed * blocks.magnitude.freeEnergy);
			expect(Math.abs(blocks[P] - singly[P])).toBeLessThanOrEqual(allowed * blocks.magnitude.pressure);
			expect(Math.abs(blocks[G] - singly[G])).toBeLessThanOrEqual(
				allowed * blocks.magnitude.pressureGradient
			);
		}
	});

	it('keeps its digits at a contrast of 1e-6, where plain differences leave ten', () => {
		const permittivity = 4;
		const contrast = 2 ** -20;
		const pressureAt = (relative: number) => {
			const body: MaterialModel = {
				permittivity: { kind: 'constant', value: permittivity * (1 + relative) }
			};
			const medium: MaterialModel = { permittivity: { kind: 'constant', value: permittivity } };
			return slowForces(between(bulk(body), medium, bulk(body), 0), 100).pressurePa;
		};
		// P = contrast^2 (a + b contrast + ...): two contrasts give a to about contrast^2
		const limit = (4 * pressureAt(contrast) - pressureAt(2 * contrast) / 2) / (2 * contrast ** 2);
		// dilute limit of two half-spaces: P = -23 hbar c (delta eps/eps)^2/(640 pi^2 sqrt(eps) d^4)
		const hbarC = (6.62607015e-34 / (2 * Math.PI)) * 299792458;
		const dilute = (-23 * hbarC) / (640 * Math.PI ** 2 * Math.sqrt(permittivity) * 1e-28);
		expect(Math.abs(limit / dilute - 1)).toBeLessThan(1e-11);
	});
});
