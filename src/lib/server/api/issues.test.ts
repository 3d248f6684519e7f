import { describe, expect, it } from 'vitest';
import { forceRequest } from '../../schemas/force.ts';
import { InvalidInput } from '../errors.ts';
import { fieldPath, parseInput } from './issues.ts';

const vacuum = { permittivity: { kind: 'vacuum' } };
const gold = { permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 } };
const request = (change: object) => ({
	arrangement: { left: { substrate: gold }, medium: vacuum, right: { substrate: gold } },
	separationsNm: [100],
	...change
});

function pathsOf(value: unknown): string[] {
	try {
		parseInput(forceRequest, value);
	} catch (error) {
		if (error instanceof InvalidInput) return error.issues.map(({ path }) => path);
	}
	return [];
}

describe('fieldPath', () => {
	it('writes indices in brackets and names with dots', () => {
		expect(fieldPath(['arrangement', 'left', 'layers', 0, 'thicknessNm'])).toBe(
			'arrangement.left.layers[0].thicknessNm'
		);
		expect(fieldPath([])).toBe('');
	});
});

describe('parseInput', () => {
	it('fills in the defaults of a valid request', () => {
		expect(parseInput(forceRequest, request({}))).toMatchObject({
			relativeAccuracy: 1e-6,
			arrangement: { temperatureK: 300, shape: { kind: 'plates' }, left: { layers: [] } }
		});
	});

	it.each([
		['the array of a union', { separationsNm: [10, -1] }, 'separationsNm[1]'],
		['the object of a union', { separationsNm: { from: 1, to: 2, count: 1e6 } }, 'separationsNm.count'],
		['neither of a union', { separationsNm: 'ten' }, 'separationsNm'],
		['an unknown field', { seperationsNm: [1] }, 'seperationsNm'],
		['a number', { relativeAccuracy: 1e-12 }, 'relativeAccuracy']
	])('names %s', (_what, change, path) => {
		expect(pathsOf(request(change))).toEqual([path]);
	});

	it('stops listing after a hundred', () => {
		expect(pathsOf(request({ separationsNm: new Array(500).fill(-1) }))).toHaveLength(100);
	});
});
