import { describe, expect, it } from 'vitest';
import { evaluate, type ForceRequest } from '../engine/index.ts';
import { bandOf, deviationAt, deviationsOf } from './bands.ts';
import { seriesOf } from './series.ts';

const request = (
	relative: number | undefined,
	shape: ForceRequest['arrangement']['shape']
): ForceRequest => ({
	arrangement: {
		left: {
			layers: [],
			substrate: {
				permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
				...(relative === undefined ? {} : { uncertainty: { kind: 'scale', relative } })
			}
		},
		medium: { permittivity: { kind: 'vacuum' } },
		right: { layers: [], substrate: { permittivity: { kind: 'constant', value: 3 } } },
		shape,
		temperatureK: 300
	},
	separationsNm: { from: 10, to: 1000, count: 9, spacing: 'log' },
	relativeAccuracy: 1e-6,
	include: ['uncertainty']
});
const pointsOf = (relative?: number, shape: ForceRequest['arrangement']['shape'] = { kind: 'plates' }) =>
	evaluate(request(relative, shape)).points;

describe('a band of uncertain data', () => {
	it('lies one standard uncertainty to either side of the curve', () => {
		const points = pointsOf(0.1);
		const deviations = deviationsOf(points, 'pressure', false);
		const band = bandOf(seriesOf(points, 'pressure'), deviations);
		const [point] = points;
		expect(band?.separationsNm).toHaveLength(9);
		expect(band?.high[0]).toBeCloseTo(-point.pressurePa + Number(point.uncertainty?.pressurePa.value), 6);
		expect(band?.low[0]).toBeCloseTo(-point.pressurePa - Number(point.uncertainty?.pressurePa.value), 6);
	});

	it('is read between computed separations like the power that it is', () => {
		const deviations = { separationsNm: [1, 10, 100], values: [1e6, 1e3, 1] };
		expect(deviationAt(deviations, Math.sqrt(10))).toBeCloseTo(10 ** 4.5, 6);
		expect(deviationAt(deviations, 100)).toBe(1);
		expect(deviationAt(deviations, 0.5)).toBeUndefined();
		expect(deviationAt(deviations, 101)).toBeUndefined();
	});

	it('ends at zero where the sign is open', () => {
		const series = { separationsNm: [1, 10], values: [-2, 0.5], bounds: [0, 0], met: [true, true] };
		const band = bandOf(series, { separationsNm: [1, 10], values: [1, 1] });
		expect(band?.low).toEqual([1, 0]);
		expect(band?.high).toEqual([3, 1.5]);
	});

	it('is none without a statement about the data, of a gradient, or of a cylinder', () => {
		expect(deviationsOf(pointsOf(), 'pressure', false)).toBeNull();
		expect(deviationsOf(pointsOf(0.1), 'gradient', false)).toBeNull();
		expect(deviationsOf(pointsOf(0.1, { kind: 'cylinderPlate', radiusUm: 10 }), 'force', true)).toBeNull();
	});

	it('of the force on a sphere is that of the free energy', () => {
		const points = pointsOf(0.1, { kind: 'spherePlate', radiusUm: 10 });
		const deviations = deviationsOf(points, 'force', false);
		const [{ forceN, freeEnergyJPerM2, uncertainty }] = points;
		expect(Number(deviations?.values[0]) / Math.abs(Number(forceN))).toBeCloseTo(
			Number(uncertainty?.freeEnergyJPerM2.value) / Math.abs(freeEnergyJPerM2),
			10
		);
	});
});
