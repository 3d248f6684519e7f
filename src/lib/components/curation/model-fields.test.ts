import { describe, expect, it } from 'vitest';
import { permittivityModel } from '$lib/schemas/permittivity.ts';
import { CLOSED_FORMS, emptyPart, jsonOf, partsOf, type TypedPart } from './model-fields.ts';

/** Every figure of a form filled with a number that the contract takes. */
const filled = (kind: TypedPart['kind']): TypedPart => {
	const part = emptyPart(kind);
	const fill = (texts: Record<string, string>) =>
		Object.fromEntries(Object.keys(texts).map((name, index) => [name, `${index + 1}.5e0`]));
	return { ...part, figures: fill(part.figures), terms: part.terms.map(fill) };
};

describe('the form of closed forms', () => {
	it.each(CLOSED_FORMS.map(({ kind }) => kind))(
		'writes %s as the contract has it, and reads it back',
		(kind) => {
			const json = jsonOf([filled(kind)]);
			expect(permittivityModel.safeParse(JSON.parse(json)).error).toBeUndefined();
			expect(partsOf(json)?.[0].kind).toBe(kind);
			expect(jsonOf(partsOf(json) ?? [])).toBe(json);
		}
	);

	it('writes several as a sum', () => {
		const json = jsonOf([filled('drude'), filled('lorentz')]);
		const parsed = permittivityModel.parse(JSON.parse(json));
		expect(parsed.kind === 'sum' && parsed.of.map(({ kind }) => kind)).toEqual(['drude', 'lorentz']);
		expect(partsOf(json)).toHaveLength(2);
	});

	it('leaves what it has no fields for to the JSON', () => {
		expect(partsOf('{"kind":"table"}')).toBeNull();
		expect(partsOf('{"kind":"drude","plasmaEnergyEv":9,"dampingEv":0.03,"note":"x"}')).toBeNull();
		expect(partsOf('{"kind":')).toBeNull();
		expect(partsOf('[]')).toBeNull();
	});

	it('lets a slip reach the server as it was typed', () => {
		const part = emptyPart('drude');
		expect(JSON.parse(jsonOf([{ ...part, figures: { plasmaEnergyEv: '9,0', dampingEv: '0.03' } }]))).toEqual({
			kind: 'drude',
			plasmaEnergyEv: '9,0',
			dampingEv: 0.03
		});
	});
});
