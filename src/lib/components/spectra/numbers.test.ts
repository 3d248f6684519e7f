import { describe, expect, it } from 'vitest';
import { epsilonNumbers, numbersCsv, realNumbers, shownRows } from './numbers.ts';

const aSeries = {
	slug: 'gold-a',
	title: 'Gold a',
	letter: 'A',
	ink: 2,
	measuredRangeEv: null,
	xiRadPerS: [1e14, 1e15, 1e16],
	epsilon: [7941.3, 141.51, 4.725300000000001],
	extrapolatedShare: null
};

describe('the numbers behind a drawing', () => {
	it('gives every sample with the separation and the energy it stands for', () => {
		const { columns, units, rows } = epsilonNumbers([aSeries]);
		expect(columns).toHaveLength(units.length);
		expect(rows).toHaveLength(3);
		expect(rows[1][1]).toBeCloseTo(0.6582119569, 9);
		expect(rows[1][2]).toBeCloseTo(149.896229, 6);
		expect(rows[1][3]).toBeCloseTo(141.51, 10);
	});

	it('leaves a cell empty where a second dataset does not reach', () => {
		const short = { ...aSeries, slug: 'b', xiRadPerS: [1e15, 1e16], epsilon: [2, 2] };
		const csv = numbersCsv(epsilonNumbers([aSeries, short]), []);
		expect(csv.split('\r\n')[2].endsWith(',')).toBe(true);
		expect(shownRows(epsilonNumbers([aSeries, short]))[0][4]).toBe('');
		expect(epsilonNumbers([])).toMatchObject({ rows: [] });
	});

	it('writes figures that read back to the same value', () => {
		const { real } = {
			real: { energyEv: [0.1 + 0.2], n: [1e-300], k: [5e-324], epsilon1: [-2.5], epsilon2: [3] }
		};
		const cells = numbersCsv(realNumbers({ real }), ['from a test']).split('\r\n')[3].split(',').map(Number);
		expect(cells[0]).toBe(0.1 + 0.2);
		expect(cells.slice(2)).toEqual([1e-300, 5e-324, -2.5, 3]);
	});

	it('starts with where the numbers come from, on lines of their own', () => {
		const lines = numbersCsv(epsilonNumbers([aSeries]), ['first\nline', 'second']).split('\r\n');
		expect(lines.slice(0, 4)).toEqual([
			'# first line',
			'# second',
			'xi,photon_energy,separation_c_over_2d,epsilon_gold-a',
			'rad/s,eV,nm,1'
		]);
	});
});
