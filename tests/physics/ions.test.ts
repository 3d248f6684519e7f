import { describe, expect, it } from 'vitest';
import {
	debyeLength,
	evaluate,
	Refusal,
	type ForceRequest,
	type MaterialModel
} from '../../src/lib/engine/index.ts';
import { between, metal, silica, vacuum, water } from '../support/analysis-arrangements.ts';

/** Gouy-Chapman, 1:1, eps 78.4, 298.15 K, with the vacuum permittivity of CODATA 2022; m. */
const LENGTHS: [molPerL: number, expected: number][] = [
	[0.001, 9.61370080157468e-9],
	[0.01, 3.040119127636245e-9],
	[0.1, 9.61370080157468e-10],
	[1, 3.040119127636245e-10]
];

const constant = (value: number): MaterialModel => ({ permittivity: { kind: 'constant', value } });
const staticTm = (request: ForceRequest): number =>
	Number(evaluate(request).points[0].breakdown?.freeEnergyJPerM2.zeroTm);

describe('the Debye length', () => {
	it.each(LENGTHS)('of %f mol/L', (molPerL, expected) => {
		expect(Math.abs(debyeLength(molPerL, 1, 298.15, 78.4) / expected - 1)).toBeLessThan(1e-12);
	});

	it('halves with a double charge', () => {
		expect(debyeLength(0.01, 2, 298.15, 78.4)).toBeCloseTo(3.040119127636245e-9 / 2, 20);
	});
});

describe('ions in the medium', () => {
	const wet = (options: Parameters<typeof between>[3]) =>
		between(constant(3.8), constant(78.4), constant(3.8), {
			separationsNm: [5],
			include: ['breakdown'],
			...options
		});

	it('screen the static term by the length that follows from the salt', () => {
		// Mitchell and Richmond 1974, extended precision.
		expect(staticTm(wet({ salt: { molPerL: 0.001, valence: 1 } })) / -2.159550971624957e-6).toBeCloseTo(1, 9);
		expect(staticTm(wet({ salt: { molPerL: 0.1, valence: 1 } })) / -1.057191862458828e-9).toBeCloseTo(1, 9);
	});

	it('take the static permittivity that is stated before that of the model', () => {
		const own = staticTm(wet({ salt: { molPerL: 0.001, valence: 1, staticPermittivity: 78.4 } }));
		const other = staticTm(wet({ salt: { molPerL: 0.001, valence: 1, staticPermittivity: 40 } }));
		expect(own / -2.159550971624957e-6).toBeCloseTo(1, 9);
		expect(Math.abs(other)).toBeLessThan(Math.abs(own));
	});

	it('leave the static term whole where they count for nothing, and none of it where it is off', () => {
		// Without ions, from the closed form: -3.087692804e-6 J/m^2.
		expect(staticTm(wet({})) / -3.087692804e-6).toBeCloseTo(1, 8);
		expect(staticTm(wet({ ions: 'full', salt: { molPerL: 0.1, valence: 1 } }))).toBe(staticTm(wet({})));
		expect(staticTm(wet({ ions: 'off' }))).toBe(0);
	});

	it('touch no other term', () => {
		const parts = (options: Parameters<typeof between>[3]) =>
			evaluate(between(silica, water, metal, { include: ['breakdown'], ...options })).points[0].breakdown
				?.pressurePa;
		const dry = parts({});
		for (const options of [{ ions: 'off' as const }, { salt: { molPerL: 0.1, valence: 1 } }])
			expect(parts(options)).toMatchObject({ te: dry?.te, tm: dry?.tm, zeroTe: dry?.zeroTe });
	});

	it.each<[path: string, options: Parameters<typeof between>[3]]>([
		['arrangement.ions', { ions: 'screened' }],
		['arrangement.salt', { debyeLengthNm: 3, salt: { molPerL: 0.1, valence: 1 } }],
		['arrangement.salt.molPerL', { salt: { molPerL: 0, valence: 1 } }],
		['arrangement.salt.valence', { salt: { molPerL: 0.1, valence: 1.5 } }],
		['arrangement.salt', { salt: { molPerL: 0.1, valence: 1 }, temperatureK: 0 }]
	])('are refused at %s', (path, options) => {
		expect(issuesOf(between(silica, water, silica, options))).toContain(path);
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

describe('the dc conductivity of a dielectric', () => {
	const counted: MaterialModel = { ...silica, zeroFrequency: 'dcCounted' };
	const written: MaterialModel = {
		permittivity: { kind: 'sum', of: [silica.permittivity, { kind: 'dcConductivity', siemensPerM: 1e-10 }] }
	};

	it('makes its static reflection that of a metal where it is counted, and changes nothing else', () => {
		const parts = (material: MaterialModel) =>
			evaluate(between(metal, vacuum, material, { include: ['breakdown'] })).points[0].breakdown?.pressurePa;
		const [plain, on, model] = [parts(silica), parts(counted), parts(written)];
		const conductors = parts(metal);
		expect(on?.zeroTm).toBe(conductors?.zeroTm);
		expect(on).toMatchObject({ te: plain?.te, tm: plain?.tm, zeroTe: 0 });
		// The same by a conductivity in the model, which adds next to nothing at n >= 1.
		expect(model?.zeroTm).toBe(on?.zeroTm);
		expect(Math.abs(Number(model?.tm) / Number(on?.tm) - 1)).toBeLessThan(1e-9);
	});

	it('can be left out of a model that states it', () => {
		const ignored = { ...written, zeroFrequency: 'dcIgnored' } as const;
		const of = (material: MaterialModel) =>
			evaluate(between(metal, vacuum, material, { include: ['breakdown'] })).points[0].breakdown?.pressurePa;
		expect(of(ignored)?.zeroTm).toBe(of(silica)?.zeroTm);
	});

	it.each<[string, string, ForceRequest]>([
		[
			'on a metal',
			'arrangement.left.substrate.zeroFrequency',
			between({ ...metal, zeroFrequency: 'dcCounted' }, vacuum, silica)
		],
		[
			'left out of a metal',
			'arrangement.left.substrate.zeroFrequency',
			between({ ...metal, zeroFrequency: 'dcIgnored' }, vacuum, silica)
		],
		[
			'left out where there is none',
			'arrangement.right.substrate.zeroFrequency',
			between(metal, vacuum, { ...silica, zeroFrequency: 'dcIgnored' })
		],
		[
			'in the medium',
			'arrangement.medium.zeroFrequency',
			between(metal, { ...water, zeroFrequency: 'dcCounted' }, silica)
		],
		[
			'in a medium that conducts',
			'arrangement.right.substrate.zeroFrequency',
			between(metal, { ...metal, zeroFrequency: 'drude' }, counted)
		]
	])('is refused %s', (_, path, request) => {
		expect(issuesOf(request)).toContain(path);
	});
});
