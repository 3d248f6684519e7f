import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../../engine/contract.ts';
import type { TableReading } from '../../schemas/upload.ts';
import { canonicalJson, sha256 } from './canonical.ts';
import { fingerprint } from './fingerprint.ts';
import { mapColumns } from './upload/map-columns.ts';
import { parseSheet } from './upload/parse.ts';

describe('canonicalJson', () => {
	it('does not depend on the order of keys, and leaves out what is undefined', () => {
		expect(canonicalJson({ b: [1, { d: 2, c: null }], a: 'x', e: undefined })).toBe(
			'{"a":"x","b":[1,{"c":null,"d":2}]}'
		);
	});

	it.each([Number.NaN, Number.POSITIVE_INFINITY])('refuses %s', (value) => {
		expect(() => canonicalJson({ value })).toThrow(RangeError);
	});

	it('gives the digest that other tools give', () => {
		expect(sha256('abc')).toBe('sha256:ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad');
	});
});

const table = (
	text: string,
	unit: TableReading['abscissa']['unit'],
	lowEnd: TableReading['lowEnd'] = { kind: 'none' }
) => {
	const mapped = mapColumns(parseSheet(text, { delimiter: ',', decimal: '.' }), {
		abscissa: { column: 1, unit },
		ordinates: [
			{ column: 2, quantity: 'n' },
			{ column: 3, quantity: 'k' }
		],
		duplicates: 'refuse',
		lowEnd,
		highEnd: { kind: 'none' }
	});
	return fingerprint(mapped.model, mapped.rows?.epsilon1 ?? null);
};

describe('fingerprint', () => {
	const inNm = table('500,2,1\n400,3,0.5\n', 'nm');

	it('is the same for the same numbers in other notation, unit and order of rows', () => {
		expect(table('400.0,3.00,5e-1\n5.00e2,2,1.000\n', 'nm')).toBe(inNm);
		expect(table('0.5,2,1\n0.4,3,0.5\n', 'um')).toBe(inNm);
		expect(table('20000,2,1\n25000,3,0.5\n', 'cm^-1')).toBe(inNm);
	});

	it('does not depend on the ends, which are a choice and not data', () => {
		expect(table('500,2,1\n400,3,0.5\n', 'nm', { kind: 'plasma', plasmaEnergyEv: 9 })).toBe(inNm);
	});

	it('moves with any number', () => {
		expect(table('500,2,1\n400,3,0.50001\n', 'nm')).not.toBe(inNm);
		const drude = (dampingEv: number): PermittivityModel => ({ kind: 'drude', plasmaEnergyEv: 9, dampingEv });
		expect(fingerprint(drude(0.035), null)).not.toBe(fingerprint(drude(0.0350001), null));
	});
});
