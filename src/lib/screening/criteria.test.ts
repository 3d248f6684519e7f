import { describe, expect, it } from 'vitest';
import { coatingFigure, judge, spreadFigure, trapIn, windowOf } from './criteria.ts';

const SEPARATIONS = [10, 20, 40, 80];
const ALL = [0, 1, 2, 3];

describe('criteria', () => {
	it('take the separations of their window, ends included', () => {
		expect(windowOf({ kind: 'repulsive', fromNm: 20, toNm: 40 }, SEPARATIONS)).toEqual([1, 2]);
		expect(windowOf({ kind: 'repulsive' }, SEPARATIONS)).toEqual(ALL);
		expect(windowOf({ kind: 'repulsive', fromNm: 100 }, SEPARATIONS)).toEqual([]);
	});

	it('call repulsive what repels at every separation of the window', () => {
		expect(judge({ kind: 'repulsive' }, SEPARATIONS, [4, 3, 2, 1], ALL)).toEqual({
			qualifies: true,
			figure: 1
		});
		expect(judge({ kind: 'repulsive' }, SEPARATIONS, [4, 3, -2, 1], ALL)).toEqual({
			qualifies: false,
			figure: -2
		});
		expect(judge({ kind: 'repulsive' }, SEPARATIONS, [4, 3, NaN, 1], ALL)).toEqual({
			qualifies: false,
			figure: null
		});
	});

	it('measure magnitude and pull', () => {
		expect(judge({ kind: 'below', pressurePa: 3 }, SEPARATIONS, [-4, 3, 2, 1], ALL)).toEqual({
			qualifies: false,
			figure: 4
		});
		expect(judge({ kind: 'below', pressurePa: 3 }, SEPARATIONS, [-4, 3, 2, 1], [1, 2, 3])).toEqual({
			qualifies: true,
			figure: 3
		});
		expect(judge({ kind: 'leastAdhesion' }, SEPARATIONS, [-4, 3, 2, 1], ALL).figure).toBe(4);
		expect(judge({ kind: 'leastAdhesion' }, SEPARATIONS, [4, 3, 2, 1], ALL).figure).toBe(0);
	});

	it('find a trap where repulsion at short separations meets attraction at long ones, and only there', () => {
		// P = -100 ln(d/30) crosses zero at 30 nm with dP/dd = -100/(30 nm).
		const pressures = SEPARATIONS.map((d) => -100 * Math.log(d / 30));
		const trap = trapIn(SEPARATIONS, pressures, ALL);
		expect(trap?.separationNm).toBeCloseTo(30, 9);
		expect(trap?.stiffnessPaPerM).toBeCloseTo(100 / 30e-9, -2);
		expect(
			trapIn(
				SEPARATIONS,
				pressures.map((value) => -value),
				ALL
			)
		).toBeNull();
		expect(judge({ kind: 'stiffestTrap' }, SEPARATIONS, pressures, ALL).figure).toBe(trap?.stiffnessPaPerM);
	});

	it('compare data and thicknesses', () => {
		expect(spreadFigure([2, -1], [1, -2], [4, -1], [0, 1])).toEqual({ qualifies: true, figure: 1.5 });
		expect(spreadFigure([0, -1], [1, -2], [4, -1], [0, 1])).toEqual({ qualifies: false, figure: null });
		expect(
			coatingFigure({ pressures: [-10], thicknessNm: 5 }, { pressures: [-20], thicknessNm: 10 }, [0])
		).toBe(0.1);
	});
});
