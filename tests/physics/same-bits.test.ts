import { describe, expect, it } from 'vitest';
import { evaluate, prepare, type ForceRequest } from '$lib/engine/index.ts';
import { randomRequest } from '../support/random-requests.ts';

/** The same request has the same bits, whatever else was computed before, beside and in which order. */

const EVERYTHING: ForceRequest['include'] = ['breakdown', 'analysis', 'terms', 'sensitivity', 'uncertainty'];

/** A random arrangement with everything asked for, at four separations. */
function asked(seed: number): ForceRequest {
	const request = randomRequest(seed);
	const { left } = request.arrangement;
	if (left.substrate.permittivity.kind !== 'idealConductor')
		left.substrate = { ...left.substrate, uncertainty: { kind: 'scale', relative: 0.03 } };
	return { ...request, separationsNm: [3, 20, 150, 4000], relativeAccuracy: 1e-6, include: EVERYTHING };
}

const SEEDS = [2, 3, 4, 6, 8, 9, 10, 16, 22, 24];

describe('all that is said of a point', () => {
	it.each(SEEDS)('has the same bits alone, backwards and between others (seed %i)', (seed) => {
		const request = asked(seed);
		const together = evaluate(request).points;
		const separations = request.separationsNm as number[];
		const alone = separations.map((nm) => evaluate({ ...request, separationsNm: [nm] }).points[0]);
		expect(alone).toEqual(together);

		const preparation = prepare(structuredClone(request));
		const other = prepare(asked(seed + 1));
		const between = [3, 2, 1, 0].map((index) => {
			other.point(index);
			return preparation.point(index);
		});
		expect(between.reverse()).toEqual(together);
	});

	it('has the same bits from the text of the request', () => {
		for (const seed of SEEDS.slice(0, 4)) {
			const request = asked(seed);
			expect(evaluate(JSON.parse(JSON.stringify(request)) as ForceRequest)).toEqual(evaluate(request));
		}
	});

	it('has the same bits whatever is asked for beside it', () => {
		for (const seed of SEEDS.slice(0, 4)) {
			const request = asked(seed);
			const plain = evaluate({ ...request, include: [] }).points;
			evaluate(request).points.forEach((point, i) => expect(point).toMatchObject(plain[i]));
		}
	});
});
