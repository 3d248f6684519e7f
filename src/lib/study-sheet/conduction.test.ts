import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../engine/contract.ts';
import { staticLimit } from './conduction.ts';

const drude: PermittivityModel = { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 };
const plasma: PermittivityModel = { kind: 'plasma', plasmaEnergyEv: 9 };
const table = (lowEnd: Extract<PermittivityModel, { kind: 'table' }>['lowEnd']): PermittivityModel => ({
	kind: 'table',
	energiesEv: [1, 2],
	epsilon2: [1, 1],
	lowEnd,
	highEnd: { kind: 'none' }
});
const lorentz = (energyEv: number, dampingEv: number): PermittivityModel => ({
	kind: 'lorentz',
	terms: [{ strengthEv2: 50, energyEv, dampingEv }]
});

describe('the static limit of a model as written', () => {
	it.each<[string, PermittivityModel, string]>([
		['a lossy metal', drude, 'drude'],
		['a Drude metal without damping', { ...drude, dampingEv: 0 }, 'plasma'],
		['a plasma', plasma, 'plasma'],
		['an ideal conductor', { kind: 'idealConductor' }, 'ideal'],
		['a table with a Drude low end', table({ kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.03 }), 'drude'],
		['a table with a power law', table({ kind: 'power', exponent: 1 }), 'finite'],
		['an oscillator at zero energy', lorentz(0, 0.05), 'drude'],
		['an oscillator at zero energy without damping', lorentz(0, 0), 'plasma'],
		['a bound oscillator', lorentz(5, 0), 'finite'],
		['a leaking liquid', { kind: 'dcConductivity', siemensPerM: 1e-4 }, 'drude'],
		['plasma with core oscillators', { kind: 'sum', of: [plasma, lorentz(5, 1)] }, 'plasma'],
		['plasma beside a lossy part', { kind: 'sum', of: [plasma, drude] }, 'drude'],
		['vacuum', { kind: 'vacuum' }, 'finite']
	])('of %s', (_, model, limit) => {
		expect(staticLimit(model)).toBe(limit);
	});
});
