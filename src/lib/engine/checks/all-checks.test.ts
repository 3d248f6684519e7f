import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../contract.ts';
import { permittivityOnRealAxis } from '../permittivity/evaluator.ts';
import { radPerSFromEv } from '../units.ts';
import { runChecks } from './all-checks.ts';
import type { CheckSubject } from './check.ts';

const GOLD: CheckSubject['material'] = {
	class: 'metal',
	formula: 'Au',
	densityGPerCm3: 19.3,
	staticPermittivity: null
};
const SILICA: CheckSubject['material'] = {
	class: 'insulator',
	formula: 'SiO2',
	densityGPerCm3: 2.2,
	staticPermittivity: 3.8
};

const outcomes = (subject: CheckSubject) =>
	new Map(runChecks(subject).map((outcome) => [outcome.code, outcome]));
const ofModel = (model: PermittivityModel, material = SILICA) => outcomes({ model, rows: null, material });

type Table = Extract<PermittivityModel, { kind: 'table' }>;

/** A table as an instrument would give it: an oscillator sampled finely enough, with the ends that continue it. */
function sampled({ count = 400, from = 0.05, to = 200 } = {}) {
	const oscillator: PermittivityModel = {
		kind: 'lorentz',
		terms: [{ strengthEv2: 300, energyEv: 11, dampingEv: 4 }]
	};
	const at = permittivityOnRealAxis(oscillator);
	const energiesEv = Array.from({ length: count }, (_, index) => from * (to / from) ** (index / (count - 1)));
	const values = energiesEv.map((energy) => at(radPerSFromEv(energy)));
	return {
		energiesEv,
		epsilon1: values.map(({ epsRe }) => epsRe),
		epsilon2: values.map(({ epsIm }) => epsIm)
	};
}

function ofTable(
	rows: { energiesEv: number[]; epsilon1: number[] | null; epsilon2: number[] },
	change: Partial<Table> = {},
	material: Partial<CheckSubject['material']> = {}
) {
	const model: Table = {
		kind: 'table',
		energiesEv: rows.energiesEv,
		epsilon2: rows.epsilon2,
		lowEnd: { kind: 'power', exponent: 1 },
		highEnd: { kind: 'power', exponent: 3 },
		...change
	};
	return outcomes({ model, rows, material: { ...SILICA, staticPermittivity: 1 + 300 / 121, ...material } });
}

describe('a table that is in order', () => {
	const all = ofTable(sampled());

	it('passes every check with a sentence and a figure', () => {
		expect([...all.keys()]).toEqual([
			'order',
			'unit-slip',
			'spacing',
			'passivity',
			'monotone',
			'static-limit',
			'high-frequency-limit',
			'kramers-kronig-residual',
			'f-sum-rule',
			'reliance'
		]);
		for (const outcome of all.values()) {
			expect(outcome.severity, outcome.message).toBe('info');
			expect(outcome.message).toMatch(/^[A-Z0-9e].*\.$/);
		}
	});

	it('is found consistent by Kramers-Kronig to a per cent', () => {
		expect(all.get('kramers-kronig-residual')?.figure).toBeLessThan(0.01);
	});
});

describe('the checks find', () => {
	const good = sampled();

	it('points out of order and twice, and then stop', () => {
		const swapped = [...good.energiesEv];
		[swapped[10], swapped[11]] = [swapped[11], swapped[10]];
		const all = ofTable({ ...good, energiesEv: swapped });
		expect(all.get('order')).toMatchObject({ severity: 'fail', figure: 12 });
		expect([...all.keys()]).toEqual(['order', 'passivity']);
		const twice = [...good.energiesEv];
		twice[5] = twice[4];
		expect(ofTable({ ...good, energiesEv: twice }).get('order')).toMatchObject({
			severity: 'fail',
			figure: 6
		});
	});

	it("a negative eps''", () => {
		const epsilon2 = good.epsilon2.map((value, index) => (index === 30 ? -value : value));
		const passivity = ofTable({ ...good, epsilon2 }).get('passivity');
		expect(passivity?.severity).toBe('fail');
		expect(passivity?.figure).toBeLessThan(0);
	});

	it('gaps wider than a tenth in ln(omega)', () => {
		const keep = (_: number, index: number) => index < 200 || index > 215;
		const gappy = {
			energiesEv: good.energiesEv.filter(keep),
			epsilon1: good.epsilon1.filter(keep),
			epsilon2: good.epsilon2.filter(keep)
		};
		const step = Math.log(200 / 0.05) / 399;
		expect(ofTable(gappy).get('spacing')).toMatchObject({
			severity: 'warn',
			figure: expect.closeTo(17 * step, 9)
		});
	});

	it("an eps' that does not belong to its eps''", () => {
		const epsilon1 = good.epsilon1.map((value) => value + 0.8);
		expect(ofTable({ ...good, epsilon1 }).get('kramers-kronig-residual')?.severity).toBe('warn');
		expect(ofTable({ ...good, epsilon1: null }).has('kramers-kronig-residual')).toBe(false);
	});

	it('more electrons than there are', () => {
		const epsilon2 = good.epsilon2.map((value) => value * 5);
		const rule = ofTable({ ...good, epsilon1: null, epsilon2 }).get('f-sum-rule');
		// 1500 eV^2 of 30 electrons: (28.8 eV)^2/n per electron at 2.2 g/cm3 and 60.08 g/mol is 30.41 eV^2.
		expect(rule).toMatchObject({ severity: 'warn', figure: expect.closeTo(1500 / 30.406 / 30, 1) });
	});

	it('a unit taken for another', () => {
		const narrow = sampled({ count: 80, from: 1, to: 20 });
		const scaled = (factor: number) => {
			const energiesEv = narrow.energiesEv.map((energy) => energy * factor);
			return ofTable({ energiesEv, epsilon1: null, epsilon2: narrow.epsilon2 }).get('unit-slip');
		};
		expect(scaled(1)?.severity).toBe('info');
		expect(scaled(1e5)).toMatchObject({
			severity: 'warn',
			message: expect.stringContaining('unit of the abscissa')
		});
		expect(scaled(1e-5)).toMatchObject({
			severity: 'warn',
			message: expect.stringContaining('unit of the abscissa')
		});
		expect(scaled(10)).toMatchObject({ severity: 'warn', message: expect.stringContaining('a factor') });
	});

	it('a step at the joint with a Drude low end', () => {
		const drude = (plasmaEnergyEv: number) =>
			ofTable(good, { lowEnd: { kind: 'drude', plasmaEnergyEv, dampingEv: 0.05 } }, { class: 'metal' }).get(
				'joints'
			);
		const matching = Math.sqrt((good.epsilon2[0] * 0.05 * (0.05 ** 2 + 0.05 ** 2)) / 0.05);
		expect(drude(matching)).toMatchObject({ severity: 'info', figure: expect.closeTo(0, 9) });
		expect(drude(2 * matching)).toMatchObject({ severity: 'warn', figure: expect.closeTo(3, 9) });
	});

	it('a table that leaves most of eps(i xi) to its ends', () => {
		const narrow = sampled({ count: 40, from: 20, to: 40 });
		const reliance = ofTable(
			narrow,
			{ lowEnd: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 } },
			GOLD
		).get('reliance');
		expect(reliance?.severity).toBe('warn');
		expect(reliance?.figure).toBeGreaterThan(0.9);
	});

	it('a static value that is not the known one', () => {
		const twoOscillators = (infrared: number): PermittivityModel => ({
			kind: 'ninhamParsegian',
			terms: [
				{ strength: infrared, frequencyRadPerS: 1.9e14 },
				{ strength: 1.1, frequencyRadPerS: 2e16 }
			]
		});
		expect(ofModel(twoOscillators(1.7)).get('static-limit')).toMatchObject({
			severity: 'info',
			figure: expect.closeTo(0, 9)
		});
		expect(ofModel(twoOscillators(0.7)).get('static-limit')).toMatchObject({
			severity: 'warn',
			figure: expect.closeTo(2.8 / 3.8 - 1, 9)
		});
	});

	it('a metal that does not conduct and an insulator that does', () => {
		const drude: PermittivityModel = { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 };
		const lorentz: PermittivityModel = {
			kind: 'lorentz',
			terms: [{ strengthEv2: 300, energyEv: 11, dampingEv: 4 }]
		};
		expect(ofModel(drude, GOLD).get('static-limit')?.severity).toBe('info');
		expect(ofModel(drude).get('static-limit')?.severity).toBe('warn');
		expect(ofModel(lorentz, GOLD).get('static-limit')?.severity).toBe('warn');
	});

	it('a constant that stays at high frequency', () => {
		const withConstant: PermittivityModel = {
			kind: 'sum',
			of: [
				{ kind: 'constant', value: 1.035 },
				{ kind: 'ninhamParsegian', terms: [{ strength: 10.8, frequencyRadPerS: 6.6e15 }] }
			]
		};
		expect(ofModel(withConstant).get('high-frequency-limit')).toMatchObject({
			severity: 'warn',
			figure: expect.closeTo(0.035, 6)
		});
	});

	it('an eps(i xi) that rises, by a table on the imaginary axis', () => {
		const rising: PermittivityModel = {
			kind: 'imaginaryTable',
			frequenciesRadPerS: [1e13, 1e14, 1e15, 1e16],
			epsilon: [3, 3.2, 2, 1.1]
		};
		expect(() => ofModel(rising)).toThrow();
	});
});

it('takes less than a second for 2000 rows', () => {
	const rows = sampled({ count: 2000 });
	const begin = performance.now();
	ofTable(rows);
	expect(performance.now() - begin).toBeLessThan(1000);
});
