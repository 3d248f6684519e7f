import { describe, expect, it } from 'vitest';
import { logScale } from '../../study-sheet/log-scale.ts';
import { sectionParts } from './section.ts';

const x = logScale([1, 10_000], [70, 470]);
const layer = (thicknessNm: number) => ({
	...{ name: 'gold', materialClass: 'metal' as const, thicknessNm },
	label: 'gold'
});
const substrate = { name: 'silica', materialClass: 'insulator' as const };

describe('the cross-section', () => {
	it('draws a right layer from d to d + t on the axis itself', () => {
		const [coating, rest] = sectionParts.right({ layers: [layer(90)], substrate }, x, 10, 470);
		expect(coating.x).toBeCloseTo(170, 9);
		expect(coating.width).toBeCloseTo(100, 9);
		expect(rest.x + rest.width).toBeCloseTo(470, 9);
	});

	it('cuts a layer off at the end of the axis', () => {
		const [coating, rest] = sectionParts.right({ layers: [layer(1e6)], substrate }, x, 10, 470);
		expect(coating.x + coating.width).toBe(470);
		expect(rest.width).toBe(0);
	});

	it('keeps many left layers inside the margin, surface first', () => {
		const parts = sectionParts.left({ layers: Array.from({ length: 12 }, () => layer(1000)), substrate }, 70);
		expect(parts).toHaveLength(13);
		expect(parts[0].x + parts[0].width).toBeCloseTo(70, 9);
		for (const { x: from, width } of parts) {
			expect(from).toBeGreaterThan(0);
			expect(width).toBeGreaterThan(0);
		}
	});
});
