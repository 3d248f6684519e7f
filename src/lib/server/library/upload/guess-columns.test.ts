import { describe, expect, it } from 'vitest';
import { guessColumns } from './guess-columns.ts';
import { parseSheet } from './parse.ts';

const guess = (text: string) => guessColumns(parseSheet(text));
const ROWS = '200;1.4;1.3;0.01\n400;1.6;1.9;0.02\n';

describe('guessColumns', () => {
	it.each([
		['wavelength (nm);n;k;s_n', ['abscissa', 'n', 'k', 'uncertainty:2'], 'nm'],
		['Energy [eV];eps1;eps2;x', ['abscissa', 'epsilon1', 'epsilon2', ''], 'eV'],
		["E / eV;eps';eps'';sigma(eps2)", ['abscissa', 'epsilon1', 'epsilon2', 'uncertainty:3'], 'eV'],
		['wavenumber (cm-1);Re eps;Im eps;n', ['abscissa', 'epsilon1', 'epsilon2', 'n'], 'cm^-1'],
		['λ (µm);k;n;err n', ['abscissa', 'k', 'n', 'uncertainty:3'], 'um'],
		['omega (rad/s);eps(i xi);;', ['abscissa', 'epsilonImaginary', '', ''], 'rad/s']
	] as const)('reads %s', (heading, roles, unit) => {
		const found = guess(`${heading}\n${ROWS}`);
		expect(found.roles).toEqual(roles);
		expect(found.unit).toBe(unit);
		expect(found.unitFrom).toBe('heading');
	});

	it('takes columns without a heading for n and k, and a size of hundreds for nm', () => {
		expect(guess('200;1.4;1.3\n400;1.6;1.9\n')).toEqual({
			roles: ['abscissa', 'n', 'k'],
			unit: 'nm',
			unitFrom: 'numbers'
		});
	});

	it('leaves the unit open where eV and µm look alike', () => {
		expect(guess('0.5;1.4;1.3\n2.5;1.6;1.9\n')).toMatchObject({ unit: null, unitFrom: null });
	});
});
