import { describe, expect, it } from 'vitest';
import { movedBy, settled } from './hairline.ts';

const press = (key: string, shiftKey = false, at = 100) => movedBy({ key, shiftKey }, at, 1, 10_000);

describe('the hairline under the keyboard', () => {
	it('moves one per cent, or a third of a decade with Shift', () => {
		expect(press('ArrowRight')).toBeCloseTo(101, 10);
		expect(press('ArrowLeft')).toBeCloseTo(100 / 1.01, 10);
		expect(press('ArrowRight', true)).toBeCloseTo(100 * 10 ** (1 / 3), 10);
		expect(press('PageDown')).toBeCloseTo(100 / 10 ** (1 / 3), 10);
	});

	it('goes to the ends and never beyond them', () => {
		expect(press('Home')).toBe(1);
		expect(press('End')).toBe(10_000);
		expect(press('ArrowRight', true, 9_000)).toBe(10_000);
		expect(press('ArrowLeft', false, 1)).toBe(1);
	});

	it('leaves other keys alone', () => {
		expect(press('a')).toBeUndefined();
	});

	it('settles on four figures', () => {
		expect(settled(37.98765)).toBe(37.99);
	});
});
