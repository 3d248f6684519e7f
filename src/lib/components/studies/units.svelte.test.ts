import { beforeEach, describe, expect, it } from 'vitest';
import { UnitMemory } from './units.svelte.ts';

describe('the units of a reader', () => {
	beforeEach(() => localStorage.clear());

	it('begin as the account says', () => {
		const units = new UnitMemory();
		units.recall({ length: 'µm', pressure: 'kPa' });
		expect(units.choices).toEqual({ length: 'µm', pressure: 'kPa' });
	});

	it('stay as they were fixed here, whatever the account begins with', () => {
		new UnitMemory().fix('pressure', 'mPa');
		const units = new UnitMemory();
		units.recall({ length: 'µm', pressure: 'kPa' });
		expect(units.choices).toEqual({ length: 'µm', pressure: 'mPa' });
	});
});
