import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../../engine/contract.ts';
import { statedUncertainty } from './stated-uncertainty.ts';

const model: PermittivityModel = {
	kind: 'table',
	energiesEv: [1, 2],
	epsilon2: [4, 3],
	lowEnd: { kind: 'none' },
	highEnd: { kind: 'none' }
};
/** Wavelengths ascend, energies descend: 1239.84 nm is 1 eV. */
const rows = {
	model,
	columns: { abscissaUnit: 'nm', quantities: ['n', 'k'] },
	abscissa: [1239.841984332003 / 2, 1239.841984332003],
	first: [2, 1],
	second: [0.5, 0.2],
	uncertainties: [
		{ quantity: 'n', values: [0.06, 0.03] },
		{ quantity: 'k', values: [0.02, 0] }
	]
};

describe('the uncertainty that came with a table', () => {
	it("is that of 2 n k, relative, in the order of the model's energies", () => {
		const found = statedUncertainty(rows);
		expect(found).toMatchObject({ kind: 'table', correlation: 'independent' });
		if (found?.kind !== 'table') throw new Error('not of a table');
		expect(found.energiesEv[0]).toBeCloseTo(1, 12);
		expect(found.energiesEv[1]).toBeCloseTo(2, 12);
		expect(found.relative[0]).toBeCloseTo(0.03, 12);
		expect(found.relative[1]).toBeCloseTo(0.05, 12);
	});

	it('is that of epsilon2 where the table gave it, and says nothing where only epsilon1 is uncertain', () => {
		const columns = { abscissaUnit: 'eV', quantities: ['epsilon1', 'epsilon2'] };
		const of = (quantity: string) =>
			statedUncertainty({ ...rows, columns, uncertainties: [{ quantity, values: [0.05, 0.05] }] });
		expect(of('epsilon2')).toMatchObject({ relative: [0.1, 0.25] });
		expect(of('epsilon1')).toBeNull();
	});

	it('is none for a table without, and for a closed form', () => {
		expect(statedUncertainty({ ...rows, uncertainties: null })).toBeNull();
		expect(statedUncertainty({ ...rows, model: { kind: 'vacuum' } })).toBeNull();
	});
});
