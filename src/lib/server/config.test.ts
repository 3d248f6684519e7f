import { describe, expect, it } from 'vitest';
import { checkServing, readConfig } from './config.ts';

const database = { HAIRSBREADTH_DATABASE_URL: 'postgres://app@127.0.0.1:5999/gaps' };
const serving = { ORIGIN: 'http://localhost:4173', BODY_SIZE_LIMIT: '6M', HOST: '127.0.0.1' };

describe('readConfig', () => {
	it('needs only the address of the database', () => {
		const found = readConfig(database);
		expect(found.databaseUrl).toBe(database.HAIRSBREADTH_DATABASE_URL);
		expect(found.threads).toBeGreaterThanOrEqual(1);
		expect(found.threads).toBeLessThanOrEqual(2);
		expect(found.durability).toBe('full');
	});

	it.each([
		['HAIRSBREADTH_DATABASE_URL', undefined],
		['HAIRSBREADTH_DATABASE_URL', 'mysql://elsewhere'],
		['HAIRSBREADTH_THREADS', '0'],
		['HAIRSBREADTH_THREADS', '1.5'],
		['HAIRSBREADTH_THREADS', 'many'],
		['HAIRSBREADTH_COMPUTE_SECONDS', '-1'],
		['HAIRSBREADTH_LOG_LEVEL', 'loud'],
		['HAIRSBREADTH_DURABILITY', 'some']
	])('refuses %s = %s by name', (name, value) => {
		expect(() => readConfig({ ...database, [name]: value })).toThrow(name);
	});
});

describe('checkServing', () => {
	it('accepts a stated address, limit and origin', () => {
		expect(() => checkServing(serving)).not.toThrow();
	});

	it.each([
		['ORIGIN', undefined],
		['ORIGIN', 'gaps.example.org'],
		['ORIGIN', 'https://gaps.example.org/'],
		['BODY_SIZE_LIMIT', undefined],
		['BODY_SIZE_LIMIT', 'Infinity'],
		['HOST', undefined]
	])('refuses %s = %s by name', (name, value) => {
		expect(() => checkServing({ ...serving, [name]: value })).toThrow(name);
	});
});
