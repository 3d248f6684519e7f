import { describe, expect, it } from 'vitest';
import { labelled, rulerMarks, thermalLengthNm } from './ruler.ts';

const bare = { temperatureK: 300, marks: [] };
const names = (marks: { label: string }[]) => marks.map(({ label }) => label);

describe('marks of the ruler', () => {
	it('put the thermal length at 7.63 um for 300 K, and nowhere at zero temperature', () => {
		expect(thermalLengthNm(300)).toBeCloseTo(7632.9, 0);
		expect(names(rulerMarks({ ...bare, temperatureK: 0 }, []))).not.toContain('thermal length');
	});

	it('include ions, own marks and balances', () => {
		const marks = rulerMarks(
			{ ...bare, debyeLengthNm: 10, marks: [{ label: 'contact', separationNm: 0.3 }] },
			[{ letter: 'A', separationNm: 43, stable: true }]
		);
		expect(names(marks.filter(({ own }) => own))).toEqual(['Debye length', 'contact', 'A balances, stable']);
	});

	it('include the Debye length of salt: 0.304 nm over the root of the molarity in water at 298 K (Israelachvili 2011)', () => {
		const salted = { ...bare, temperatureK: 298.15, salt: { molPerL: 0.01, valence: 1 as const } };
		const found = rulerMarks(salted, [], 78.4).find(({ label }) => label === 'Debye length');
		expect(found?.separationNm).toBeCloseTo(3.04, 2);
		expect(names(rulerMarks(salted, []))).not.toContain('Debye length');
	});

	it('let a landmark go unnamed where its label would cover one of the reader', () => {
		const marks = rulerMarks({ ...bare, marks: [{ label: 'dimple', separationNm: 110 }] }, []);
		const named = labelled(marks, (nm) => 150 * Math.log10(nm), 80);
		expect(names([...named])).toContain('dimple');
		expect(names([...named])).not.toContain('virus');
	});
});
