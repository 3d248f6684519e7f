import { describe, expect, expectTypeOf, it } from 'vitest';
import type { ForceAnswer } from '../engine/contract.ts';
import { errorAnswer, forceAnswer, type ForceAnswerJson } from './force-answer.ts';

describe('the schema of a force answer', () => {
	it("is the engine's answer with a checksum", () => {
		expectTypeOf<Omit<ForceAnswerJson, 'inputChecksum'>>().toEqualTypeOf<ForceAnswer>();
	});

	it('refuses an answer that lost a number on the way', () => {
		const point = { separationNm: 10, freeEnergyJPerM2: null };
		const answer = {
			engine: '1.0.0',
			inputChecksum: `sha256:${'0'.repeat(64)}`,
			points: [point],
			equilibria: []
		};
		expect(forceAnswer.safeParse(answer).success).toBe(false);
	});

	it('lets an error come without a list of fields', () => {
		expect(errorAnswer.safeParse({ error: { code: 'absent', message: 'Nothing here.' } }).success).toBe(true);
	});
});
