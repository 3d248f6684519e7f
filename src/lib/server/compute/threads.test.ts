import { fileURLToPath } from 'node:url';
import { afterEach, describe, expect, it } from 'vitest';
import type { ForcePoint, ForceRequest } from '../../engine/contract.ts';
import { evaluate } from '../../engine/index.ts';
import { EnginePool } from './pool.ts';

/** The engine in threads has the bits of the engine beside the test, however many threads share the work. */

const silica = {
	permittivity: {
		kind: 'ninhamParsegian' as const,
		terms: [
			{ strength: 1.71, frequencyRadPerS: 1.88e14 },
			{ strength: 1.098, frequencyRadPerS: 2.033e16 }
		]
	}
};
const metal = { permittivity: { kind: 'drude' as const, plasmaEnergyEv: 9, dampingEv: 0.035 } };

const REQUESTS: ForceRequest[] = [0, 77, 300, 450].map((temperatureK, i) => ({
	arrangement: {
		left: { layers: [{ of: silica, thicknessNm: 4 + i }], substrate: metal },
		medium: { permittivity: { kind: 'vacuum' } },
		right: { layers: [], substrate: i % 2 === 0 ? metal : silica },
		shape: i === 3 ? { kind: 'cylinderPlate', radiusUm: 20 } : { kind: 'plates' },
		temperatureK
	},
	separationsNm: { from: 2, to: 2000, count: 24, spacing: 'log' },
	relativeAccuracy: 1e-7,
	include: ['breakdown', 'analysis', 'terms']
}));

let pool: EnginePool | undefined;
afterEach(() => pool?.close());

describe('the same request in threads', () => {
	it.each([1, 3])('has the same bits with %i of them', { timeout: 60_000 }, async (threads) => {
		const opened = new EnginePool({ threads, task: fileURLToPath(new URL('task.ts', import.meta.url)) });
		pool = opened;
		const never = new AbortController().signal;
		const answers = await Promise.all(
			REQUESTS.map(async (request) => {
				const points: ForcePoint[] = [];
				const end = await opened.run(
					request,
					{
						onStart: () => undefined,
						onPoints: (chunk) => chunk.indices.forEach((index, i) => (points[index] = chunk.points[i]))
					},
					never
				);
				return { points, equilibria: end.equilibria, warnings: end.warnings };
			})
		);
		answers.forEach((answer, i) => {
			const { points, equilibria, warnings } = evaluate(REQUESTS[i]);
			expect(answer).toEqual({ points, equilibria, warnings });
		});
	});
});
