import { describe, expect, it } from 'vitest';
import { logLattice } from '../numerics/log-lattice.ts';
import { prepare } from '../prepare.ts';
import type { ForceRequest, MaterialModel } from '../contract.ts';
import { MOST_NODES } from '../reflection/waves.ts';
import { SMALLEST_SCALE } from './frequency-terms.ts';
import { LEVELS } from './level.ts';

const metal: MaterialModel = {
	permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 },
	zeroFrequency: 'drude'
};
const glass: MaterialModel = {
	permittivity: { kind: 'ninhamParsegian', terms: [{ strength: 1.1, frequencyRadPerS: 2e16 }] }
};
const liquid: MaterialModel = {
	permittivity: { kind: 'ninhamParsegian', terms: [{ strength: 1.3, frequencyRadPerS: 1.3e16 }] }
};

const request = (temperatureK: number, relativeAccuracy: number, thicknessNm: number): ForceRequest => ({
	arrangement: {
		left: {
			layers: [
				{ of: glass, thicknessNm },
				{ of: metal, thicknessNm: 12 }
			],
			substrate: glass
		},
		medium: liquid,
		right: { layers: [{ of: glass, thicknessNm }], substrate: metal },
		shape: { kind: 'plates' },
		temperatureK
	},
	separationsNm: [1, 7, 60, 500, 4000],
	relativeAccuracy,
	include: ['breakdown']
});

describe('what is shared between points, bodies and requests', () => {
	it.each([
		[300, 1e-4],
		[300, 1e-8],
		[0, 1e-6],
		[300, 1e-11]
	])('changes no bit at %d K and %d', (temperatureK, accuracy) => {
		const asked = request(temperatureK, accuracy, 5);
		const alone = asked.separationsNm as number[];
		const fresh = alone.map((_, i) => prepare(asked).point(i));
		const one = prepare(asked);
		// Another request between any two points puts its own waves and lattices where theirs were.
		const other = prepare(request(temperatureK, accuracy, 5.5));
		const backwards = [4, 3, 2, 1, 0].map((i) => {
			other.point(i);
			return one.point(i);
		});
		expect(backwards.reverse()).toEqual(fresh);
	});

	it('has room for every lattice', () => {
		for (const { steps, paired, cut } of LEVELS)
			for (const step of [...steps, paired]) {
				const lattice = logLattice(step, 2 ** -SMALLEST_SCALE, cut, cut * 2 ** -SMALLEST_SCALE, 1 / 2);
				expect(lattice.count).toBeLessThan(MOST_NODES);
			}
	});
});
