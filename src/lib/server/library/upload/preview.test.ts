import { describe, expect, it } from 'vitest';
import { previewOf, previewOfModel, withGuess } from './preview.ts';

const bytes = (text: string) => new TextEncoder().encode(text);
const GERMAN = 'Wellenlänge (nm);n;k\n800;0,18;5,11\n600;0,25;3,0\n400;1,66;1,96\n';

describe('previewOf', () => {
	it('shows the sheet, the guess and a picture before anything was said', () => {
		const { sheet, guess, thumbnail, fileIssues, problems } = previewOf(bytes(GERMAN), {});
		expect(sheet).toMatchObject({ delimiter: ';', decimal: ',', width: 3, rowCount: 3 });
		expect(guess?.roles).toEqual(['abscissa', 'n', 'k']);
		expect([fileIssues, problems]).toEqual([[], []]);
		// eps'' = 2 n k, over rising energies: the last line of the file comes last of all.
		expect(thumbnail?.points?.map(([, value]) => value)).toEqual([
			expect.closeTo(2 * 0.18 * 5.11, 12),
			expect.closeTo(2 * 0.25 * 3, 12),
			expect.closeTo(2 * 1.66 * 1.96, 12)
		]);
		expect(thumbnail?.measuredRangeEv?.low).toBeCloseTo(1239.841984 / 800, 6);
	});

	it('follows what was said, not the guess', () => {
		const form = withGuess(
			{},
			previewOf(bytes(GERMAN), {}).guess ?? { roles: [], unit: null, unitFrom: null }
		);
		const { problems, thumbnail } = previewOf(bytes(GERMAN), { ...form, 'column.3': '' });
		expect(thumbnail).toBeNull();
		expect(problems).toEqual([{ field: 'columns', message: expect.stringContaining('give n and k') }]);
	});

	it('asks where the layout has two readings', () => {
		const { ambiguous, sheet } = previewOf(bytes('0,5,1,2\n0,6,1,3\n'), {});
		expect([ambiguous, sheet]).toEqual([true, null]);
		expect(previewOf(bytes('0,5,1,2\n0,6,1,3\n'), { delimiter: 'comma', decimal: 'point' }).ambiguous).toBe(
			false
		);
	});

	it('names the line and column of what is wrong', () => {
		const { fileIssues } = previewOf(bytes(GERMAN.replace('3,0', '3..0')), {});
		expect(fileIssues).toEqual([
			expect.objectContaining({ line: 3, column: 3, rule: 'number', text: '3..0' })
		]);
	});

	it('says by how much a Drude end misses the table', () => {
		const form = { 'lowEnd.kind': 'drude', 'lowEnd.plasmaEnergyEv': '9', 'lowEnd.dampingEv': '0.035' };
		const [joint] = previewOf(bytes(GERMAN), form).joints;
		const energy = 1239.841984 / 800;
		const drude = (81 * 0.035) / (energy * (energy ** 2 + 0.035 ** 2));
		expect(joint.percent).toBeCloseTo(100 * (drude / (2 * 0.18 * 5.11) - 1), 4);
	});

	describe('with a second table', () => {
		// The file falls in wavelength, so energies rise along it: 1.55, 2.07, 3.10 eV.
		it('joins it after the file, in whichever order it was typed, and measures the step', () => {
			for (const joined of ['200;1,43;1,4\n100;1,2;0,5', '100;1,2;0,5\n200;1,43;1,4']) {
				const { thumbnail, joints, fileIssues } = previewOf(bytes(GERMAN), { joined });
				expect(fileIssues).toEqual([]);
				expect(thumbnail?.points?.map(([energy]) => Number(energy.toFixed(3)))).toEqual([
					1.55, 2.066, 3.1, 6.199, 12.398
				]);
				const [joint] = joints;
				const [b, c] = [2 * 0.25 * 3, 2 * 1.66 * 1.96];
				const slope = Math.log(c / b) / Math.log(600 / 400);
				expect(joint).toMatchObject({ end: 'joined' });
				expect(joint.percent).toBeCloseTo(100 * ((2 * 1.43 * 1.4) / (c * 2 ** slope) - 1), 6);
			}
		});

		it('joins it before the file as well', () => {
			const { thumbnail, joints } = previewOf(bytes(GERMAN), { joined: '2000;0,9;13\n1000;0,3;6,8' });
			expect(thumbnail?.points?.[0][0]).toBeCloseTo(1239.841984 / 2000, 6);
			expect(joints[0].energyEv).toBeCloseTo(1239.841984 / 800, 6);
		});

		it('refuses one that overlaps or has other columns, naming the line', () => {
			expect(previewOf(bytes(GERMAN), { joined: '500;1;1\n200;1;1' }).fileIssues[0]).toMatchObject({
				rule: 'order',
				line: 5
			});
			expect(previewOf(bytes(GERMAN), { joined: '200;1\n100;1' }).fileIssues[0]).toMatchObject({
				rule: 'join',
				line: 5
			});
		});
	});

	it('names the field of an end that is not whole', () => {
		const { problems } = previewOf(bytes(GERMAN), { 'lowEnd.kind': 'drude', 'lowEnd.dampingEv': 'x' });
		expect(problems.map(({ field }) => field).sort()).toEqual(['lowEnd.dampingEv', 'lowEnd.plasmaEnergyEv']);
	});
});

describe('previewOfModel', () => {
	it('draws a closed form, and says what is wrong with one', () => {
		const drawn = previewOfModel({ model: '{"kind":"constant","value":2.5}' });
		expect(drawn.thumbnail?.imaginary.every(([, value]) => value === 2.5)).toBe(true);
		expect(previewOfModel({ model: '{"kind":"constant","value":"2,5"}' }).problems).toEqual([
			{ field: 'model.value', message: expect.stringMatching(/number/) }
		]);
		expect(previewOfModel({ model: '{"kind":' }).problems[0].field).toBe('model');
		expect(previewOfModel({}).problems).toEqual([]);
	});
});
