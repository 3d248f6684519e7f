import { describe, expect, it } from 'vitest';
import type { ForcePoint } from '../../engine/contract.ts';
import { compareAnswers, recomputedWords } from './recompute.ts';

const point = (pressurePa: number): ForcePoint => ({
	separationNm: 10,
	freeEnergyJPerM2: -1,
	pressurePa,
	pressureGradientPaPerM: 1,
	errorBound: { freeEnergy: 0, pressure: 0, pressureGradient: 0 },
	met: true
});

describe('recomputing', () => {
	it('calls only equal bits identical', () => {
		expect(compareAnswers([point(0.3)], [point(0.3)])).toEqual({ identical: true, largest: 0, compared: 3 });
		const { identical, largest } = compareAnswers([point(0.3)], [point(0.1 + 0.2)]);
		expect(identical).toBe(false);
		expect(largest).toBeCloseTo(1.85e-16, 18);
	});

	it('does not call a missing point identical', () => {
		expect(compareAnswers([point(1), undefined], [point(1), point(1)]).identical).toBe(false);
		expect(compareAnswers([point(1)], []).identical).toBe(false);
	});

	it('says what it found', () => {
		expect(recomputedWords([{ identical: true, largest: 0, compared: 6 }])).toContain('all 6 numbers');
		expect(recomputedWords([{ identical: false, largest: 2e-9, compared: 6 }])).toContain('2.0e-9');
		expect(recomputedWords([])).toContain('Nothing');
	});
});
