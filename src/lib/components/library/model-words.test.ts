import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../../engine/contract.ts';
import { mathRuns } from './math-runs.ts';
import { modelParts } from './model-words.ts';

const drude: PermittivityModel = { kind: 'drude', plasmaEnergyEv: 9.03, dampingEv: 0.0267 };
const lorentz: PermittivityModel = {
	kind: 'lorentz',
	terms: [
		{ strengthEv2: 7.091, energyEv: 3.05, dampingEv: 0.75 },
		{ strengthEv2: 41.46, energyEv: 4.15, dampingEv: 1.85 }
	]
};

describe('modelParts', () => {
	it('gives the figures as they are stored', () => {
		expect(modelParts(drude)[0].rows).toEqual([['9.03', '0.0267']]);
		expect(modelParts(lorentz)[0].rows).toEqual([
			['7.091', '3.05', '0.75'],
			['41.46', '4.15', '1.85']
		]);
	});

	it('lays sums inside sums out as one list', () => {
		const nested: PermittivityModel = { kind: 'sum', of: [drude, { kind: 'sum', of: [lorentz, drude] }] };
		expect(modelParts(nested).map(({ name }) => name)).toEqual(['Drude', 'Lorentz oscillators', 'Drude']);
	});

	it('says how a table is continued', () => {
		const [table] = modelParts({
			kind: 'table',
			energiesEv: [0.64, 6.6],
			epsilon2: [10, 2],
			lowEnd: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
			highEnd: { kind: 'power', exponent: 3 }
		});
		expect(table.rows).toEqual([['2', '0.64', '6.6']]);
		expect(table.notes.join(' ')).toContain('plasma energy 9 eV and damping 0.035 eV');
		expect(table.notes.join(' ')).toContain('to the power 3');
	});

	it('gives an undamped oscillator in both units', () => {
		const [part] = modelParts({
			kind: 'ninhamParsegian',
			terms: [{ strength: 1.098, frequencyRadPerS: 2.024e16 }]
		});
		expect(part.rows).toEqual([['1.098', '2.024e16', '13.3222']]);
	});

	it('has as many figures in a row as heads', () => {
		const models: PermittivityModel[] = [
			drude,
			lorentz,
			{ kind: 'vacuum' },
			{ kind: 'constant', value: 3 },
			{ kind: 'idealConductor' },
			{ kind: 'plasma', plasmaEnergyEv: 9 },
			{ kind: 'debye', terms: [{ strength: 74.8, relaxationTimePs: 10.13 }] },
			{ kind: 'dcConductivity', siemensPerM: 5 },
			{ kind: 'imaginaryTable', frequenciesRadPerS: [1e14, 1e16], epsilon: [2, 1] }
		];
		for (const { columns, rows } of models.flatMap(modelParts)) {
			for (const row of rows) expect(row).toHaveLength(columns.length);
		}
	});
});

describe('mathRuns', () => {
	it('lowers and raises what stands in braces', () => {
		expect(mathRuns('ω_{p}^{2} / ξ')).toEqual([
			{ text: 'ω', place: 'line' },
			{ text: 'p', place: 'lowered' },
			{ text: '2', place: 'raised' },
			{ text: ' / ξ', place: 'line' }
		]);
	});
});
