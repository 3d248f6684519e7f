import { describe, expect, it } from 'vitest';
import { evaluate } from '../engine/index.ts';
import type { BodyOf, MaterialModel } from '../engine/contract.ts';
import { decodeStudy } from '../schemas/study-address.ts';
import { BULK_NM, rungsOf, rungValues, settledFrom, turningPoints, withRung } from './ladder.ts';

const { study } = decodeStudy(
	new URLSearchParams('?left=gold-drude@1.0:5nm,silica@1.0&medium=water@1.0&right=silica@1.0&T=300&debye=10')
);

describe('a ladder', () => {
	it('sweeps each layer, the temperature and the salt, and nothing else', () => {
		const rungs = rungsOf(study);
		expect(rungs).toEqual([
			{ kind: 'thickness', side: 'left', layer: 0 },
			{ kind: 'temperature' },
			{ kind: 'salt' }
		]);
		expect(withRung(study, rungs[0], 80)).toEqual({
			...study,
			left: { ...study.left, layers: [{ ...study.left.layers[0], thicknessNm: 80 }] }
		});
		expect(withRung(study, rungs[1], 77)).toEqual({ ...study, temperatureK: 77 });
		// Salt goes in the place of a stated Debye length: only one of them may stand.
		expect(withRung(study, rungs[2], 0.1)).toMatchObject({ salt: { molPerL: 0.1, valence: 1 } });
		expect(withRung(study, rungs[2], 0.1).debyeLengthNm).toBeUndefined();
	});

	it('steps evenly on its axis', () => {
		expect(rungValues({ kind: 'temperature' }, 100, 400, 4)).toEqual([100, 200, 300, 400]);
		expect(rungValues({ kind: 'salt' }, 0.001, 1, 4)).toEqual([0.001, 0.01, 0.1, 1]);
	});

	it('marks where the sign turns', () => {
		expect(turningPoints([1, 2, 3], [-1, 1, 1], 'linear')).toEqual([1.5]);
		expect(turningPoints([1, 100], [-1, 1], 'logarithmic')[0]).toBeCloseTo(10, 12);
		expect(turningPoints([1, 2], [1, 1], 'linear')).toEqual([]);
	});

	it('marks where a film has become bulk, as the engine has it', () => {
		const gold: MaterialModel = { permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 } };
		const silica: MaterialModel = { permittivity: { kind: 'constant', value: 2.1 } };
		const pressure = (left: BodyOf<MaterialModel>) =>
			evaluate({
				arrangement: {
					left,
					medium: { permittivity: { kind: 'vacuum' } },
					right: { layers: [], substrate: gold },
					shape: { kind: 'plates' },
					temperatureK: 300
				},
				separationsNm: [50],
				relativeAccuracy: 1e-6,
				include: []
			}).points[0].pressurePa;
		const film = (thicknessNm: number) =>
			pressure({ layers: [{ of: gold, thicknessNm }], substrate: silica });
		const values = rungValues({ kind: 'thickness', side: 'left', layer: 0 }, 1, 300, 25);
		const bulk = film(BULK_NM);
		expect(Math.abs(bulk / pressure({ layers: [], substrate: gold }) - 1)).toBeLessThan(1e-5);
		const settled = settledFrom(values, values.map(film), bulk);
		expect(settled).toBeGreaterThan(5);
		expect(settled).toBeLessThan(100);
		expect(Math.abs(film(settled ?? 0) / bulk - 1)).toBeLessThan(0.01);
		expect(settledFrom([1, 2], [5, 5], 1)).toBeNull();
	});
});
