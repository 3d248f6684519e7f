import { afterAll, describe, expect, it } from 'vitest';
import { planForces, runForces } from '../../src/lib/server/compute/forces.ts';
import { closeEnginePool } from '../../src/lib/server/compute/pool.ts';
import { forceRequest } from '../../src/lib/schemas/force.ts';
import { decodeStudy } from '../../src/lib/schemas/study-address.ts';
import { choiceRequest } from '../../src/lib/schemas/study-request.ts';
import { WORKED_ARRANGEMENTS } from '../../src/lib/schemas/worked-arrangements.ts';
import { useDatabase } from '../support/database.ts';

/** What newcomers are offered can be computed with the library as it is seeded. */

useDatabase();
afterAll(() => closeEnginePool());

const ignore = { onStart: () => undefined, onPoints: () => undefined };

describe('a worked arrangement', () => {
	it.each(WORKED_ARRANGEMENTS.map(({ name, query }) => [name, query] as const))(
		'is computed whole: %s',
		async (_name, query) => {
			const { study } = decodeStudy(new URLSearchParams(query));
			for (const choice of study.choices) {
				const asked = forceRequest.parse(choiceRequest(study, choice, [study.atNm], ['analysis']));
				const { points } = await runForces(await planForces(asked), ignore, new AbortController().signal);
				expect(points[0].met).toBe(true);
				expect(points[0].pressurePa).not.toBe(0);
			}
		},
		30_000
	);
});
