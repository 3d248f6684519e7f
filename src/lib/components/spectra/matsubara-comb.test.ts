import { describe, expect, it } from 'vitest';
import { logScale } from '../../study-sheet/log-scale.ts';
import { XI_DOMAIN } from './epsilon-curves.ts';
import { matsubaraComb } from './matsubara-comb.ts';

describe('matsubaraComb', () => {
	const x = logScale(XI_DOMAIN, [40, 740]);

	it('starts with the first frequency of 300 K', () => {
		const { teeth } = matsubaraComb(300, x);
		expect(teeth[0]).toMatchObject({ n: 1, label: '1' });
		expect(teeth[0].x).toBeCloseTo(x.at(2.467790253640998e14), 6);
	});

	it('turns into a band where the teeth run together', () => {
		const { teeth, solidFrom } = matsubaraComb(300, x);
		const last = teeth[teeth.length - 1];
		expect(solidFrom).toBeGreaterThan(last.x);
		for (let index = 1; index < teeth.length; index++) {
			expect(teeth[index].x - teeth[index - 1].x).toBeGreaterThanOrEqual(2.5);
		}
	});

	it('leaves out what lies left of the axis, and ends for a temperature whose comb lies right of it', () => {
		expect(matsubaraComb(4, x).teeth.every((tooth) => tooth.x >= 40)).toBe(true);
		expect(matsubaraComb(1e9, x)).toEqual({ teeth: [], solidFrom: null });
	});
});
