import { describe, expect, it } from 'vitest';
import type { ForcePoint } from '../engine/contract.ts';
import {
	differencesFrom,
	readingAt,
	relativeSpread,
	signAgreement,
	spreadOf,
	type Reading
} from './readings.ts';

const point = (separationNm: number, pressurePa: number): ForcePoint => ({
	separationNm,
	freeEnergyJPerM2: 0,
	pressurePa,
	pressureGradientPaPerM: 0,
	errorBound: { freeEnergy: 0, pressure: 1e-8, pressureGradient: 0 },
	met: true
});
const series = { separationsNm: [10, 100], values: [-8, -0.008], bounds: [1e-8, 1e-8], met: [true, true] };
const choice = { letter: 'A', ink: 2, series };
const reading = (letter: string, value: number): Reading => ({
	...{ letter, ink: 2, value, bound: 1e-8, met: true },
	...{ why: undefined, shapeError: undefined, staticShare: undefined, stale: false }
});

describe('the reading under the hairline', () => {
	it('has a bound only where it was computed at this very separation', () => {
		expect(readingAt(choice, [point(38, -0.12)], 'pressure', 38)).toMatchObject({
			value: -0.12,
			bound: 1e-8
		});
		const drawn = readingAt(choice, [point(38, -0.12)], 'pressure', 39);
		expect(drawn?.bound).toBeNull();
		expect(drawn?.value).toBeCloseTo(-8000 * 39 ** -3, 10);
	});

	it('is absent outside the curve', () => {
		expect(readingAt(choice, [], 'pressure', 1)).toBeUndefined();
	});
});

describe('spread between choices', () => {
	it('is the furthest other value, relative to the own one', () => {
		const all = [reading('A', 2), reading('B', 5), reading('C', 1)];
		expect(relativeSpread(all[0], all)).toBe(1.5);
		expect(spreadOf(all)).toEqual({ low: 1, high: 5 });
	});

	it('is unknown with one choice', () => {
		expect(relativeSpread(reading('A', 2), [reading('A', 2)])).toBeNull();
		expect(spreadOf([reading('A', 2)])).toBeNull();
	});

	it.each([
		[[1], 'one'],
		[[1, 3], 'agree'],
		[[-1, 3], 'disagree'],
		[[0, 3], 'disagree']
	])('signs of %j: %s', (values, expected) => {
		expect(signAgreement(values.map((value, index) => reading('ABC'[index], value)))).toBe(expected);
	});
});

describe('the parked hairline', () => {
	it('gives the change and the mean exponent of each choice', () => {
		const [difference] = differencesFrom(
			[reading('A', -8)],
			10,
			[reading('A', -0.008), reading('B', 1)],
			100
		);
		expect(difference).toMatchObject({ letter: 'A', value: -8, change: 7.992 });
		expect(difference.exponent).toBeCloseTo(-3, 12);
	});
});
