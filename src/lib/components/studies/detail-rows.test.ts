import { describe, expect, it } from 'vitest';
import type { ForcePoint, MaterialModel } from '../../engine/contract.ts';
import { evaluate } from '../../engine/index.ts';
import { detailRows, limitReasons, termShares } from './detail-rows.ts';
import { slotOfPath, weightLines } from './frequency-weights.ts';

const metal: MaterialModel = { permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 } };
const vacuum: MaterialModel = { permittivity: { kind: 'vacuum' } };

function detail(relative?: number): {
	point: ForcePoint;
	nonRetarded: ReturnType<typeof evaluate>['nonRetarded'];
} {
	const left =
		relative === undefined ? metal : { ...metal, uncertainty: { kind: 'scale' as const, relative } };
	const { points, nonRetarded } = evaluate({
		arrangement: {
			left: { layers: [{ of: metal, thicknessNm: 5 }], substrate: left },
			medium: vacuum,
			right: { layers: [], substrate: metal },
			shape: { kind: 'plates' },
			temperatureK: 300
		},
		separationsNm: [100],
		relativeAccuracy: 1e-6,
		include: ['analysis', 'terms', 'sensitivity', 'uncertainty']
	});
	return { point: points[0], nonRetarded };
}

describe('the figures under the hairline', () => {
	const rows = (relative?: number) => detailRows([detail(relative)]).map(({ label }) => label);

	it('show what there is, and an uncertainty only where the data state one', () => {
		expect(rows()).toContain('Local exponent of free energy');
		expect(rows()).not.toContain('its limit at short separations');
		expect(rows()).not.toContain('Standard uncertainty of pressure, from the data');
		expect(rows(0.05)).toContain('Standard uncertainty of pressure, from the data');
	});

	it('say why a layered body has no limit', () => {
		expect(limitReasons([detail(), detail()])).toEqual([expect.stringContaining('Layers')]);
	});

	it('never write more digits than the bound supports', () => {
		const { point } = detail();
		const exponent = point.analysis?.pressureExponent;
		if (!exponent) throw new Error('no exponent');
		exponent.errorBound = 3e-3;
		const [row] = detailRows([{ point, nonRetarded: undefined }]).filter(
			({ label }) => label === 'of pressure'
		);
		expect(row.cells[0].replace(/[^\d]/g, '')).toHaveLength(2);
	});
});

describe('terms and frequencies', () => {
	it('are shares of the sum of magnitudes', () => {
		const shares = termShares(detail().point);
		expect(shares).toHaveLength(31);
		expect(shares.reduce((sum, one) => sum + Math.abs(one), 0)).toBeCloseTo(1, 12);
		expect(shares[0]).toBeLessThan(0);
	});

	it('leave out places on which nothing depends', () => {
		expect(weightLines(detail().point).map(({ place }) => place)).toEqual([
			'left.layers[0].of',
			'left.substrate',
			'right.substrate'
		]);
		expect(weightLines(undefined)).toEqual([]);
	});

	it('name places as a study does', () => {
		expect(['medium', 'left.substrate', 'right.layers[1].of'].map(slotOfPath)).toEqual([
			'medium',
			'left',
			'right2'
		]);
	});
});
