import { describe, expect, it } from 'vitest';
import type { MaterialModel } from './contract.ts';
import { evaluate } from './prepare.ts';
import { Refusal } from './refusal.ts';
import { screeningKernel, type ScreeningTriple } from './screening.ts';

const materials: MaterialModel[] = [
	{ permittivity: { kind: 'vacuum' } },
	{ permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 }, zeroFrequency: 'drude' },
	{ permittivity: { kind: 'ninhamParsegian', terms: [{ strength: 1.1, frequencyRadPerS: 2.03e16 }] } },
	{ permittivity: { kind: 'ninhamParsegian', terms: [{ strength: 1.4, frequencyRadPerS: 1.3e16 }] } },
	{
		permittivity: {
			kind: 'table',
			energiesEv: [1, 2, 4, 8, 16],
			epsilon2: [0.1, 0.5, 3, 1, 0.2],
			lowEnd: { kind: 'power', exponent: 1 },
			highEnd: { kind: 'power', exponent: 3 }
		}
	}
];
const bare = (substrate: number) => ({ layers: [], substrate });
const separationsNm = [2, 20, 200, 2000];
const triples: ScreeningTriple[] = [
	{ left: bare(1), medium: 0, right: bare(1) },
	{ left: bare(1), medium: 3, right: bare(2) },
	{ left: { layers: [{ of: 4, thicknessNm: 10 }], substrate: 1 }, medium: 3, right: bare(4) }
];

function whole({ left, medium, right }: ScreeningTriple, temperatureK: number, relativeAccuracy: number) {
	const named = (body: ScreeningTriple['left']) => ({
		layers: body.layers.map(({ of, thicknessNm }) => ({ of: materials[of], thicknessNm })),
		substrate: materials[body.substrate]
	});
	return evaluate({
		arrangement: {
			left: named(left),
			medium: materials[medium],
			right: named(right),
			shape: { kind: 'plates' },
			temperatureK
		},
		separationsNm,
		relativeAccuracy,
		include: []
	}).points;
}

describe('the screening kernel', () => {
	it.each([0, 300])('stays within its bound of the full evaluation at %i K', (temperatureK) => {
		const kernel = screeningKernel(materials, temperatureK, 1e-6);
		for (const triple of triples) {
			const fine = whole(triple, temperatureK, 1e-10);
			const alike = whole(triple, temperatureK, 1e-6);
			kernel.pressures(triple, separationsNm).forEach(({ pressurePa, errorBound, met }, i) => {
				const distance = Math.abs(pressurePa - fine[i].pressurePa) / Math.abs(pressurePa);
				expect(distance).toBeLessThanOrEqual(errorBound + fine[i].errorBound.pressure);
				expect(met).toBe(alike[i].errorBound.pressure <= 1e-6);
				expect(met).toBe(errorBound <= 1e-6);
			});
		}
	});

	it('gives the same bits whatever was asked for before', () => {
		const kernel = screeningKernel(materials, 300, 1e-6);
		const inOrder = triples.map((triple) => kernel.pressures(triple, separationsNm));
		const other = screeningKernel([...materials].reverse(), 300, 1e-6);
		const mirrored = (body: ScreeningTriple['left']) => ({
			layers: body.layers.map((layer) => ({ ...layer, of: 4 - layer.of })),
			substrate: 4 - body.substrate
		});
		const backwards = [...triples].reverse().map(({ left, medium, right }) => {
			const triple = { left: mirrored(left), medium: 4 - medium, right: mirrored(right) };
			return [...separationsNm].reverse().map((d) => other.pressures(triple, [d])[0]);
		});
		expect(backwards.reverse().map((points) => points.reverse())).toEqual(inOrder);
	});

	it('refuses what a request would refuse', () => {
		const kernel = screeningKernel([...materials, { permittivity: { kind: 'idealConductor' } }], 300, 1e-6);
		expect(() => kernel.pressures({ left: bare(1), medium: 5, right: bare(1) }, [10])).toThrow(Refusal);
		expect(() => kernel.pressures({ left: bare(1), medium: 0, right: bare(1) }, [-10])).toThrow(Refusal);
	});
});
