import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../../engine/contract.ts';
import { mathRuns } from './math-runs.ts';
import { modelParts } from './model-words.ts';
import { staticLimit } from '../../study-sheet/conduction.ts';

const gold: PermittivityModel = { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 };
const glass: PermittivityModel = { kind: 'constant', value: 2.1 };

const models: [string, PermittivityModel, string[]][] = [
	[
		'Brendel-Bormann oscillators',
		{ kind: 'brendelBormann', terms: [{ strengthEv2: 25, energyEv: 3, dampingEv: 0.4, widthEv: 0.6 }] },
		['25', '3', '0.4', '0.6']
	],
	[
		'Tauc-Lorentz bands',
		{ kind: 'taucLorentz', terms: [{ amplitudeEv: 100, energyEv: 4, broadeningEv: 2, gapEv: 1.5 }] },
		['100', '4', '2', '1.5']
	],
	[
		'Cody-Lorentz bands',
		{
			kind: 'codyLorentz',
			terms: [{ amplitudeEv: 100, energyEv: 4, broadeningEv: 2, gapEv: 1.5, transitionEv: 1 }]
		},
		['100', '4', '2', '1.5', '1']
	],
	[
		'Index formula',
		{
			kind: 'sellmeier',
			constant: 0,
			bandUm: { from: 0.35, to: 0.7 },
			terms: [{ strength: 0.7, wavelengthUm: 0.07 }]
		},
		['0.7', '0.07']
	]
];

describe('models of fitted bands in words', () => {
	it.each(models)('%s', (name, model, row) => {
		const [part] = modelParts(model);
		expect([part.name, part.rows]).toEqual([name, [row]]);
		expect(part.columns).toHaveLength(row.length);
		for (const text of [part.formula, ...part.columns]) expect(() => mathRuns(text)).not.toThrow();
	});
});

describe('models made of models in words', () => {
	it('name the rule of a mixture, then its phases', () => {
		const mixture: PermittivityModel = { kind: 'bruggeman', host: glass, inclusion: gold, fraction: 0.2 };
		expect(modelParts(mixture).map(({ name }) => name)).toEqual(['Bruggeman mixture', 'Constant', 'Drude']);
		expect(modelParts(mixture)[0].notes.join(' ')).toContain('0.2');
	});

	it('give each law behind the model that it governs', () => {
		const [, laws] = modelParts({
			kind: 'temperatureDependent',
			of: gold,
			rangeK: { from: 50, to: 400 },
			laws: [
				{
					parameter: 'dampingEv',
					law: { kind: 'blochGruneisen', value: 0.035, referenceK: 300, debyeK: 165, residualShare: 0.05 }
				}
			]
		});
		expect(laws.formula).toContain('50 to 400 K');
		expect(laws.rows[0]).toEqual([
			'dampingEv',
			'0.035 at 300 K, Bloch-Grüneisen, Debye temperature 165 K, residual share 0.05'
		]);
	});
});

describe('a polynomial of the temperature', () => {
	it('is written with its signs and powers', () => {
		const [, laws] = modelParts({
			kind: 'temperatureDependent',
			of: glass,
			rangeK: { from: 273, to: 372 },
			laws: [
				{
					parameter: 'value',
					law: { kind: 'polynomial', coefficients: [249, -0.79, 0.0007], scale: 'kelvin' }
				}
			]
		});
		expect(laws.rows[0][1]).toBe('249 − 0.79 T/K + 0.0007 (T/K)²');
	});
});

describe('the static term of mixtures', () => {
	const limit = (kind: 'maxwellGarnett' | 'bruggeman', host: PermittivityModel, fraction: number) =>
		staticLimit({ kind, host, inclusion: host === gold ? glass : gold, fraction });

	it('is that of the engine: hosts conduct, spheres do not, Bruggeman from a third on', () => {
		expect([0.3, 0.9].map((f) => limit('maxwellGarnett', glass, f))).toEqual(['finite', 'finite']);
		expect([0.3, 0.9].map((f) => limit('maxwellGarnett', gold, f))).toEqual(['drude', 'drude']);
		expect([0.3, 0.4].map((f) => limit('bruggeman', glass, f))).toEqual(['finite', 'drude']);
		expect([0.6, 0.7].map((f) => limit('bruggeman', gold, f))).toEqual(['drude', 'finite']);
		expect([0, 1].map((f) => limit('bruggeman', glass, f))).toEqual(['finite', 'drude']);
	});
});
