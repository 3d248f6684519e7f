import { describe, expect, expectTypeOf, it } from 'vitest';
import type { z } from 'zod';
import { forceRequest, type ForceRequestComplete } from './force.ts';

const gold = { permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 } };
const plain = {
	arrangement: {
		left: { substrate: { version: 'gold-drude@1.0' } },
		medium: { permittivity: { kind: 'vacuum' } },
		right: { substrate: gold }
	},
	separationsNm: [10, 20]
};

const issuesOf = (request: unknown) => {
	const parsed = forceRequest.safeParse(request);
	return parsed.success ? [] : parsed.error.issues.map((issue) => issue.path.join('.'));
};

describe('the schema of a force request', () => {
	it("infers the engine's own type", () => {
		expectTypeOf<z.output<typeof forceRequest>>().toEqualTypeOf<ForceRequestComplete>();
	});

	it('fills in plates, 300 K and the default accuracy', () => {
		const parsed = forceRequest.parse(plain);
		expect(parsed.arrangement.shape).toEqual({ kind: 'plates' });
		expect(parsed.arrangement.temperatureK).toBe(300);
		expect(parsed.relativeAccuracy).toBe(1e-6);
		expect(parsed.arrangement.left.layers).toEqual([]);
	});

	it.each([
		['separationsNm', { ...plain, separationsNm: [0] }, 'separationsNm.0'],
		['relativeAccuracy', { ...plain, relativeAccuracy: 1e-15 }, 'relativeAccuracy'],
		[
			'a damping given as text',
			{
				...plain,
				arrangement: {
					...plain.arrangement,
					medium: { permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: '1' } }
				}
			},
			'arrangement.medium.permittivity.dampingEv'
		],
		[
			'a field that no model has',
			{
				...plain,
				arrangement: { ...plain.arrangement, medium: { permittivity: { kind: 'vacuum', colour: 'red' } } }
			},
			'arrangement.medium.permittivity.colour'
		],
		[
			'a version without a number',
			{ ...plain, arrangement: { ...plain.arrangement, medium: { version: 'gold' } } },
			'arrangement.medium.version'
		]
	])('names the field that is wrong: %s', (_, request, path) => {
		expect(issuesOf(request)).toContain(path);
	});

	it('refuses fields that it does not know', () => {
		expect(forceRequest.safeParse({ ...plain, colour: 1 }).success).toBe(false);
	});
});
