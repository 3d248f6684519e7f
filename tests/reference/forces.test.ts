import { describe, expect, it } from 'vitest';
import { computed, figures } from './force-figures.ts';

/** Digits that the figures themselves hold: closed forms 1e-15, sums 1e-13, double integrals at T = 0 1e-12. */
const FIGURE_DIGITS = 2e-12;

describe.each(['forces.json', 'ratios.json'])('the figures of %s', (file) => {
	it.each(figures(file))('$id ($field)', (figure) => {
		const { value, bound } = computed(figure);
		const off = Math.abs(value / figure.value - 1);
		expect(off, `${value} against ${figure.value}: ${figure.source}`).toBeLessThanOrEqual(
			Math.max(figure.relTol, FIGURE_DIGITS)
		);
		// Where the figure is known well enough to judge the bound, the bound covers the difference.
		if (figure.relTol <= 1e-9) expect(off).toBeLessThanOrEqual(bound + FIGURE_DIGITS);
	});
});
