import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import type { ForcePoint } from '../engine/contract.ts';
import { curveCsv, tableRows } from './curve-table.ts';

const point = (separationNm: number, pressurePa: number): ForcePoint => ({
	separationNm,
	freeEnergyJPerM2: 0,
	pressurePa,
	pressureGradientPaPerM: 0,
	errorBound: { freeEnergy: 0, pressure: 1.5e-8, pressureGradient: 0 },
	met: true
});
const columns = [
	{ letter: 'A', points: [point(10, -0.1 - 0.2), undefined, point(1, -5e-324)] },
	{ letter: 'B', points: [point(10, 1 / 3)] }
];

describe('the plotted numbers as rows', () => {
	it('meet at their separation, with a hole where a choice has no value yet', () => {
		const rows = tableRows(columns, 'pressure');
		expect(rows.map(({ separationNm }) => separationNm)).toEqual([1, 10]);
		expect(rows[0].cells[1]).toBeUndefined();
		expect(rows[1].cells[1]).toEqual({ value: 1 / 3, bound: 1.5e-8 });
	});

	it('are read back from CSV to the last bit', () => {
		const text = curveCsv(columns, 'pressure', 'Pa', ['Gold against\nsilica']);
		const lines = text.split('\r\n');
		expect(lines.slice(0, 3)).toEqual([
			'# Gold against silica',
			'separation,pressure_A,bound_A,pressure_B,bound_B',
			'nm,Pa,1,Pa,1'
		]);
		const { data } = Papa.parse<string[]>(text, { comments: '#', skipEmptyLines: true });
		expect(data.slice(2).map((row) => row.map((cell) => (cell === '' ? null : Number(cell))))).toEqual([
			[1, -5e-324, 1.5e-8, null, null],
			[10, -0.1 - 0.2, 1.5e-8, 1 / 3, 1.5e-8]
		]);
	});
});
