import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../contract.ts';
import { agreement } from './agreement.ts';
import type { CheckSubject } from './check.ts';

const GOLD: CheckSubject['material'] = {
	class: 'metal',
	formula: 'Au',
	densityGPerCm3: 19.3,
	staticPermittivity: null
};
/** Drude figures of gold as published by several groups differ by a few per cent. */
const drude = (plasmaEnergyEv: number): PermittivityModel => ({
	kind: 'drude',
	plasmaEnergyEv,
	dampingEv: 0.035
});
const check = (model: PermittivityModel, others?: CheckSubject['others']) =>
	agreement({ model, rows: null, material: GOLD, others });

describe('agreement', () => {
	it('says nothing where there is nothing to agree with', () => {
		expect(check(drude(9))).toBeNull();
		expect(check(drude(9), [])).toBeNull();
		expect(check(drude(9), [{ ref: 'a@1.0', model: { kind: 'idealConductor' } }])).toBeNull();
	});

	it('names the nearest and the farthest with the figure', () => {
		const found = check(drude(9), [
			{ ref: 'far@1.0', model: drude(6) },
			{ ref: 'near@1.0', model: drude(8.9) }
		]);
		// At low frequency the ratio of eps is that of the squares of the plasma energies.
		expect(found?.figure).toBeCloseTo((9 / 8.9) ** 2 - 1, 3);
		expect(found).toMatchObject({ severity: 'info', message: expect.stringContaining('near@1.0') });
		expect(found?.message).toContain('far@1.0, the farthest');
	});

	it('asks about a slip of a factor, whichever of the two is the larger', () => {
		for (const [first, second] of [
			[9, 0.9],
			[0.9, 9]
		]) {
			expect(check(drude(first), [{ ref: 'other@1.0', model: drude(second) }])?.severity).toBe('warn');
		}
	});

	it('lets one sample differ from another as samples of gold do', () => {
		expect(check(drude(9), [{ ref: 'other@1.0', model: drude(9.9) }])?.severity).toBe('info');
	});
});
